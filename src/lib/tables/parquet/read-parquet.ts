import {
  type AsyncBuffer,
  type Compressors,
  type DecodedArray,
  type FileMetaData,
  parquetMetadataAsync,
  parquetRead,
  parquetSchema,
} from "hyparquet"
import { compressors } from "hyparquet-compressors"
import { ArrayFailure, type ArraySource } from "../arrays/array-source"
import { ListingReport } from "../arrays/listing-report"
import { readArrays } from "../arrays/read-arrays"
import type { ColumnWriter } from "../columns/column-writer"
import { IntakeRefusal } from "../intake-codes"
import type { IntakeLimits } from "../intake-limits"
import type { ReadContext } from "../read-context"
import type { ByteSource } from "../source/byte-source"
import type { TableReading } from "../table-reading"
import { type ParquetColumn, kindOf, parquetColumn } from "./parquet-column"
import { writeValues } from "./write-values"

interface OpenParquet {
  readonly file: AsyncBuffer
  readonly metadata: FileMetaData
  readonly unpackers: Compressors
  /** Rows of each row group. */
  readonly groups: readonly number[]
}

/**
 * Reads a Parquet file column by column, one row group at a time.
 *
 * @throws IntakeRefusal parquet-damaged, parquet-codec, parquet-type and those of readArrays
 * @see docs/intake.md, Parquet
 */
export async function readParquet(source: ByteSource, context: ReadContext): Promise<TableReading> {
  const open = await openParquet(source, context.limits)
  const rows = open.groups.reduce((sum, count) => sum + count, 0)
  const report = new ListingReport()
  const sources: ArraySource[] = []
  for (const child of await damagedIfThrows(() => parquetSchema(open.metadata).children)) {
    const column = parquetColumn(child)
    if ("code" in column) report.problem(column.code, column.name, column.about)
    else if (rows > 0) sources.push(columnSource(open, column, rows, report))
  }
  if (sources.length === 0) throw report.refusal()
  return readArrays(
    { format: "parquet", sources, metadata: [], report: (journal) => report.tell(journal) },
    context,
  )
}

async function openParquet(source: ByteSource, limits: IntakeLimits): Promise<OpenParquet> {
  const file: AsyncBuffer = {
    byteLength: source.size,
    async slice(start, end = source.size) {
      const length = Math.min(end, source.size) - start
      if (!(start >= 0) || !(length >= 0)) throw new RangeError("A range outside the file.")
      const bytes = await source.read(start, length)
      const own = bytes.byteOffset === 0 && bytes.byteLength === bytes.buffer.byteLength
      return own ? (bytes.buffer as ArrayBuffer) : Uint8Array.from(bytes).buffer
    },
  }
  const end = await source.read(source.size - 4, 4)
  if (Buffer.from(end).toString("latin1") !== "PAR1") throw new IntakeRefusal("parquet-damaged")
  const metadata = await damagedIfThrows(() => parquetMetadataAsync(file, { geoparquet: false }))
  const known = new Set(["UNCOMPRESSED", ...Object.keys(compressors)])
  for (const group of metadata.row_groups)
    for (const { meta_data: chunk } of group.columns)
      if (chunk && !known.has(chunk.codec)) throw new IntakeRefusal("parquet-codec", { codec: chunk.codec })
  const groups = metadata.row_groups.map((group) => Number(group.num_rows))
  if (groups.some((rows) => !Number.isSafeInteger(rows) || rows < 0))
    throw new IntakeRefusal("parquet-damaged")
  return { file, metadata, groups, unpackers: boundedUnpackers(limits) }
}

/** The library trusts the size that a page declares; no page is larger than a whole file may be. */
function boundedUnpackers(limits: IntakeLimits): Compressors {
  const bounded = Object.entries(compressors).map(([codec, unpack]) => [
    codec,
    (input: Uint8Array, length: number) => {
      if (!(length >= 0 && length <= limits.maxBytes)) throw new RangeError("A page of impossible size.")
      return unpack(input, length)
    },
  ])
  return Object.fromEntries(bounded) as Compressors
}

function columnSource(
  open: OpenParquet,
  column: ParquetColumn,
  rows: number,
  report: ListingReport,
): ArraySource {
  const { name, values } = column
  const names = values.as === "complex" ? [`${name}.re`, `${name}.im`] : [name]
  if (values.as === "complex") report.note("complex-split", { column: name, re: names[0]!, im: names[1]! })
  if (kindOf(values) === "text") report.note("text-column", { column: name })
  return {
    place: name,
    group: "",
    shape: [rows],
    labels: [],
    scales: [],
    outputs: names.map((each) => ({
      name: each,
      unit: null,
      symbol: null,
      longName: null,
      kind: kindOf(values),
    })),
    async read(writers) {
      let start = 0
      for (const count of open.groups) {
        await readGroup(open, column, start, count, writers)
        start += count
      }
    },
  }
}

async function readGroup(
  { file, metadata, unpackers }: OpenParquet,
  column: ParquetColumn,
  start: number,
  count: number,
  writers: readonly ColumnWriter[],
): Promise<void> {
  if (count === 0) return
  const pieces: { at: number; data: DecodedArray }[] = []
  await damagedIfThrows(() =>
    parquetRead({
      file,
      metadata,
      compressors: unpackers,
      columns: [column.name],
      rowStart: start,
      rowEnd: start + count,
      utf8: false,
      geoparquet: false,
      parsers: {
        // The library would cut these to milliseconds.
        timestampFromMilliseconds: (ticks) => ticks,
        timestampFromMicroseconds: (ticks) => ticks,
        timestampFromNanoseconds: (ticks) => ticks,
        dateFromDays: (days) => days,
      },
      onChunk: ({ columnData, rowStart }) => pieces.push({ at: rowStart, data: columnData }),
    }),
  )
  pieces.sort((a, b) => a.at - b.at)
  const found = pieces.reduce((sum, { data }) => sum + data.length, 0)
  if (found !== count || pieces[0]?.at !== start) throw new IntakeRefusal("parquet-damaged")
  for (const { data } of pieces) await damagedIfThrows(() => writeValues(column.values, data, writers))
}

/** The library's errors on damaged files have many wordings and one meaning. */
async function damagedIfThrows<Result>(read: () => Result | Promise<Result>): Promise<Result> {
  try {
    return await read()
  } catch (error) {
    if (error instanceof IntakeRefusal || error instanceof ArrayFailure) throw error
    throw new IntakeRefusal("parquet-damaged")
  }
}
