import type { ColumnSink } from "./column-chunk"
import { type ContentFormat, detectFormat, formatOfHead, otherFormatInName } from "./detect-format"
import { readHdf5 } from "./hdf5/read-hdf5"
import { IntakeRefusal, sentence } from "./intake-codes"
import { intakeLimits } from "./intake-limits"
import { readJsonLines } from "./json-lines/read-json-lines"
import { readNpy } from "./npy/read-npy"
import { openRecipe } from "./open-recipe"
import { readParquet } from "./parquet/read-parquet"
import type { ReadContext, ReadOptions } from "./read-context"
import type { RecipeInput } from "./reading-recipe"
import type { ByteSource } from "./source/byte-source"
import { gunzipped } from "./source/gzip-stream"
import { PieceReader } from "./source/piece-reader"
import { withTemporaryFile } from "./source/temporary-file"
import type { TableFormat, TableReading } from "./table-reading"
import { readText } from "./text/read-text"
import { readZip } from "./zip/read-zip"

/**
 * Reads a table from bytes: recognises the format by content, reads every value once and hands the columns to `sink` in
 * parts of 65,536 rows. Memory stays bounded by one part, whatever the size of the file.
 *
 * What cannot be read is in `refused` of the result, and what the sink was given is then void; only an abort, a failing
 * source and a failing sink throw.
 *
 * @param sink takes the columns; without one only the summary is made
 * @see docs/intake.md
 */
export async function readTable(
  source: ByteSource,
  options: ReadOptions = {},
  sink: ColumnSink | null = null,
): Promise<TableReading> {
  const limits = { ...intakeLimits, ...options.limits }
  const context: ReadContext = { ...options, recipe: options.recipe ?? {}, limits, sink }
  const seen: { format: TableFormat } = { format: "text" }
  try {
    if (source.size > limits.maxBytes)
      throw new IntakeRefusal("file-too-large", { n: source.size, max: limits.maxBytes })
    if (source.size === 0) throw new IntakeRefusal("empty-file")
    return checkName(source.name, await readContent(source, context, seen))
  } catch (error) {
    if (error instanceof IntakeRefusal) return refusedReading(seen.format, context.recipe, error)
    throw error
  }
}

type Seen = { format: TableFormat }

async function readContent(source: ByteSource, context: ReadContext, seen: Seen): Promise<TableReading> {
  const format = await detectFormat(source)
  if (format === "gzip") return readGzip(source, context, seen)
  if (format === "zip") {
    seen.format = "npz"
    return readZip(source, context, (entry, inner) =>
      readStream({ ...entry, packedSize: entry.size }, inner, seen),
    )
  }
  return readPlain(format, source, context, seen)
}

async function readGzip(source: ByteSource, context: ReadContext, seen: Seen): Promise<TableReading> {
  const { limits } = context
  const open = () => gunzipped(source, limits)
  const name = source.name.replace(/\.gz$/i, "")
  const reading = await readStream({ name, packedSize: source.size, open }, context, seen)
  return { ...reading, notes: [{ code: "gzip", message: sentence("gzip") }, ...reading.notes] }
}

/** Unpacked bytes that come as a stream only. */
interface PackedStream {
  readonly name: string
  readonly packedSize: number
  /** Bytes when unpacked, if the archive says so. */
  readonly size?: number
  open(): AsyncIterable<Uint8Array>
}

/** Formats that jump about in a file get it on disk. */
async function readStream(stream: PackedStream, context: ReadContext, seen: Seen): Promise<TableReading> {
  const reader = new PieceReader(stream.open())
  const head = await reader.take(4096)
  await reader.close()
  if (head.length === 0) throw new IntakeRefusal("empty-file")
  const format = formatOfHead(head)
  if (format === "gzip") throw new IntakeRefusal("gzip-nested")
  if (format === "hdf5" || format === "parquet" || format === "zip")
    return withTemporaryFile(stream.name, stream.open(), (source) =>
      format === "zip"
        ? readZip(source, context, () => Promise.reject(new IntakeRefusal("gzip-nested")))
        : readPlain(format, source, context, seen),
    )
  // An array has to know its size; of a text it only serves to show progress.
  const size = stream.size ?? (format === "npy" ? await lengthOf(stream) : stream.packedSize)
  return readPlain(format, asSource(stream, size), context, seen)
}

async function lengthOf(stream: PackedStream): Promise<number> {
  let length = 0
  for await (const piece of stream.open()) length += piece.length
  return length
}

/** A stream as a source for formats that read from beginning to end. */
const asSource = (stream: PackedStream, size: number): ByteSource => ({
  name: stream.name,
  size,
  stream: () => stream.open(),
  read: (offset) => Promise.reject(new Error(`This source has no byte ${offset} to jump to.`)),
})

async function readPlain(
  format: Exclude<ContentFormat, "gzip" | "zip">,
  source: ByteSource,
  context: ReadContext,
  seen: Seen,
): Promise<TableReading> {
  seen.format = format
  const stream = { name: source.name, size: source.size, open: () => source.stream() }
  if (format === "npy") return readNpy(stream, context)
  if (format === "text") return readText(stream, context)
  if (format === "hdf5") return readHdf5(source, context)
  if (format === "parquet") return readParquet(source, context)
  return readJsonLines(stream, context)
}

/** The content decides; a name that promises another format is mentioned. */
function checkName(name: string, reading: TableReading): TableReading {
  const named = otherFormatInName(name, reading.format)
  if (named === null) return reading
  const { format } = reading
  const problem = {
    line: null,
    column: null,
    code: "format-by-content" as const,
    message: sentence("format-by-content", { named, format }),
  }
  return {
    ...reading,
    problems: [problem, ...reading.problems],
    problemCounts: [{ code: problem.code, count: 1 }, ...reading.problemCounts],
  }
}

function refusedReading(format: TableFormat, recipe: RecipeInput, refusal: IntakeRefusal): TableReading {
  const { code, message, line, column } = refusal
  return {
    format,
    recipe: { ...openRecipe, ...recipe, columns: null },
    columns: [],
    rows: 0,
    lineAccount: null,
    preview: { first: [], last: [] },
    metadata: [],
    notes: [],
    problems: [],
    problemCounts: [],
    asks: [],
    refused: { code, message, line, column },
  }
}
