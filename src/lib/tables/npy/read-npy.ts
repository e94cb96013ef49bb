import { ListingReport } from "../arrays/listing-report"
import { readArrays } from "../arrays/read-arrays"
import type { ReadContext } from "../read-context"
import type { TableReading } from "../table-reading"
import { npySource } from "./npy-source"

/**
 * Reads an NPY file, plain or unpacked from gzip.
 *
 * @throws IntakeRefusal npy-header, npy-version, npy-object, npy-dtype, npy-truncated and those of readArrays
 */
export async function readNpy(
  stream: { readonly name: string; readonly size: number; open(): AsyncIterable<Uint8Array> },
  context: ReadContext,
): Promise<TableReading> {
  const report = new ListingReport()
  const name = stream.name.replace(/(\.npy)?(\.gz)?$/i, "") || "array"
  const source = await npySource({ ...stream, name, place: "array", prefix: "" }, report)
  if (!source) throw report.refusal()
  return readArrays(
    { format: "npy", sources: [source], metadata: [], report: (journal) => report.tell(journal) },
    context,
  )
}
