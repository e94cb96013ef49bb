import { ListingReport } from "../arrays/listing-report"
import { readArrays } from "../arrays/read-arrays"
import type { ReadContext } from "../read-context"
import type { ByteSource } from "../source/byte-source"
import { isFileBacked, withTemporaryFile } from "../source/temporary-file"
import type { TableReading } from "../table-reading"
import { Hdf5Process } from "./hdf5-process"
import { hdf5Source } from "./hdf5-sources"

/**
 * Reads an HDF5 file in a process of its own.
 *
 * @throws IntakeRefusal hdf5-damaged, hdf5-timeout, hdf5-crashed and those of readArrays
 * @see docs/intake.md, HDF5
 */
export async function readHdf5(source: ByteSource, context: ReadContext): Promise<TableReading> {
  if (!isFileBacked(source))
    return withTemporaryFile(source.name, source.stream(), (file) => readHdf5(file, context))
  const reader = new Hdf5Process(context.limits.maxAnswerMs)
  try {
    const { datasets, metadata, problems, notes } = await reader.list(source.path)
    const report = new ListingReport()
    for (const { code, path, values } of problems) report.problem(code, path, values)
    for (const { code, values } of notes) report.note(code, values)
    const sources = datasets.flatMap((dataset) => hdf5Source(dataset, reader, report) ?? [])
    if (sources.length === 0) throw report.refusal()
    return await readArrays(
      { format: "hdf5", sources, metadata, report: (journal) => report.tell(journal) },
      context,
    )
  } finally {
    reader.close()
  }
}
