import { type ArraySource, elementsOf, numberWriter, textWriter } from "../arrays/array-source"
import { decodeNumbers, writeTexts } from "../arrays/decode-elements"
import type { ListingReport } from "../arrays/listing-report"
import type { ColumnWriter } from "../columns/column-writer"
import { PieceReader } from "../source/piece-reader"
import type { ColumnKind } from "../table-reading"
import { inMemoryOrder } from "./fortran-order"
import { type NpyField, type NpyLayout, isComplexType, isTextType, npyLayout } from "./npy-dtype"
import { type NpyHeader, npyHeader } from "./npy-header"

/** One NPY stream: a file, or an entry of an archive. */
export interface NpyStream {
  /** What problems call it. */
  readonly place: string
  /** What its column is called. */
  readonly name: string
  /** Put before the names of the fields of a structured array. */
  readonly prefix: string
  /** Bytes. */
  readonly size: number
  open(): AsyncIterable<Uint8Array>
}

const BATCH_BYTES = 512 * 1024

/**
 * Looks into an NPY stream without reading its values.
 *
 * @returns null when nothing of it can be read; `report` says why
 */
export async function npySource(stream: NpyStream, report: ListingReport): Promise<ArraySource | null> {
  const reader = new PieceReader(stream.open())
  const header = await npyHeader(reader)
  await reader.close()
  const { place } = stream
  if (typeof header === "string") {
    report.problem(header, place)
    return null
  }
  const layout = npyLayout(header.dtype)
  if (layout === null || layout === "npy-object") {
    const type = typeof header.dtype === "string" ? header.dtype : "structure"
    report.problem(layout ?? "npy-dtype", place, { type })
    return null
  }
  const elements = elementsOf(header.shape)
  const needed = elements * layout.size
  const present = stream.size - header.length
  if (needed > present) {
    report.problem("npy-truncated", place, { k: present, n: needed })
    return null
  }
  if (needed < present) report.problem("npy-extra-bytes", place, { n: present - needed })
  const fields = readableFields(stream, layout, header, report)
  if (elements === 0) report.note("empty-dataset", { name: place })
  if (elements === 0 || fields.length === 0) return null
  if (header.fortran && header.shape.length > 1) report.note("fortran-order", { name: place })
  const names = fields.map(({ name }) => (layout.structured ? stream.prefix + name : stream.name))
  fields.forEach(({ type }, index) => {
    const [re, im] = [`${names[index]}.re`, `${names[index]}.im`]
    if (isComplexType(type)) report.note("complex-split", { column: names[index]!, re, im })
  })
  return {
    place,
    group: "",
    shape: header.shape,
    labels: [],
    scales: [],
    outputs: fields.flatMap(({ type }, index) => outputsOf(type, names[index]!)),
    read: (writers) => readValues(stream, header, layout, fields, writers),
  }
}

type ReadableField = NpyField & { readonly type: string }

function readableFields(
  stream: NpyStream,
  layout: NpyLayout,
  header: NpyHeader,
  report: ListingReport,
): ReadableField[] {
  return layout.fields.filter((field): field is ReadableField => {
    const readable = field.type !== null && !(isTextType(field.type) && header.shape.length !== 1)
    const place = layout.structured ? stream.prefix + field.name : stream.place
    if (!readable) report.problem("npy-dtype", place, { type: field.written })
    return readable
  })
}

function outputsOf(type: string, name: string) {
  const kind: ColumnKind = isTextType(type) ? "text" : type === "b1" ? "boolean" : "number"
  const output = { unit: null, symbol: null, longName: null, kind }
  return (isComplexType(type) ? [`${name}.re`, `${name}.im`] : [name]).map((each) => ({
    ...output,
    name: each,
  }))
}

async function readValues(
  stream: NpyStream,
  header: NpyHeader,
  layout: NpyLayout,
  fields: readonly ReadableField[],
  writers: readonly ColumnWriter[],
): Promise<void> {
  const reader = new PieceReader(stream.open())
  await reader.take(header.length)
  const elements = elementsOf(header.shape)
  const perBatch = Math.max(1, Math.floor(BATCH_BYTES / layout.size))
  const transposed = header.fortran && header.shape.length > 1
  const batches = transposed
    ? inMemoryOrder(await reader.take(elements * layout.size), header.shape, layout.size, perBatch)
    : inFileOrder(reader, elements, layout.size, perBatch)
  for await (const bytes of batches) {
    const count = bytes.length / layout.size
    let next = 0
    for (const field of fields)
      next += await writeField(field, bytes, layout.size, count, writers.slice(next))
  }
  // What follows the values is read too: an archive checks its sum at the end.
  await reader.drain()
}

async function* inFileOrder(reader: PieceReader, elements: number, size: number, perBatch: number) {
  // Aligned for doubles, which are then taken as they are.
  const batch = new Uint8Array(new ArrayBuffer(perBatch * size))
  for (let left = elements; left > 0; left -= perBatch) {
    const part = batch.subarray(0, Math.min(left, perBatch) * size)
    await reader.fill(part)
    yield part
  }
}

/** Decodes one field of a batch; returns how many writers it took. */
async function writeField(
  { type, offset, size, littleEndian }: ReadableField,
  bytes: Uint8Array,
  stride: number,
  count: number,
  writers: readonly ColumnWriter[],
): Promise<number> {
  const elements = { bytes, offset, stride, count, littleEndian }
  if (isTextType(type)) {
    await writeTexts(type.startsWith("U") ? "utf-32" : "bytes", elements, size, textWriter(writers[0]))
    return 1
  }
  const parts = isComplexType(type) ? 2 : 1
  const partType = isComplexType(type) ? `f${size / 2}` : type
  for (let part = 0; part < parts; part++) {
    const writer = numberWriter(writers[part])
    const at = offset + (part * size) / 2
    await writer.write(decodeNumbers(partType, { ...elements, offset: at }, writer))
  }
  return parts
}
