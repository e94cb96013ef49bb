import { type ArraySource, numberWriter, textWriter } from "../arrays/array-source"
import { decodeNumbers, writeTexts } from "../arrays/decode-elements"
import type { ListingReport } from "../arrays/listing-report"
import type { ColumnWriter } from "../columns/column-writer"
import type { ColumnKind } from "../table-reading"
import { decodeValue } from "./decode-value"
import type { Hdf5Process } from "./hdf5-process"
import type { Hdf5Dataset, Hdf5Member, Hdf5Type } from "./hdf5-protocol"
import { slabs } from "./slabs"

/** The arrays of a listing; what of a compound cannot be read is reported and left out. */
export function hdf5Source(
  dataset: Hdf5Dataset,
  reader: Hdf5Process,
  report: ListingReport,
): ArraySource | null {
  const { path, type, shape } = dataset
  const parts = partsOf(dataset).filter((part) => {
    const text = isText(part.type) && shape.length > 1
    const unread = part.type.kind === "unread" || part.type.kind === "compound" || text
    if (unread) report.problem("hdf5-type", part.name, { type: typeName(part.type) })
    return !unread
  })
  if (parts.length === 0) return null
  for (const { name, type: partType } of parts)
    if (partType.kind === "complex")
      report.note("complex-split", { column: name, re: `${name}.re`, im: `${name}.im` })
  const { unit, symbol, longName } = dataset
  return {
    place: path,
    group: path.slice(0, Math.max(0, path.lastIndexOf("/"))),
    shape,
    labels: dataset.labels,
    scales: dataset.scales,
    outputs: parts.flatMap((part) => {
      const kind: ColumnKind = isText(part.type)
        ? "text"
        : part.type.kind === "boolean"
          ? "boolean"
          : "number"
      const names = part.type.kind === "complex" ? [`${part.name}.re`, `${part.name}.im`] : [part.name]
      return names.map((name) => ({ name, unit, symbol, longName, kind }))
    }),
    async read(writers) {
      for (const slab of slabs(shape, dataset.chunks, type)) {
        const answer = await reader.read({ path, type, ...slab })
        if ("texts" in answer) await textWriter(writers[0]).write(answer.texts)
        else if ("bytes" in answer) await writeParts(answer.bytes, type.size, parts, writers)
      }
    },
  }
}

function partsOf({ path, type }: Hdf5Dataset): Hdf5Member[] {
  if (type.kind !== "compound") return [{ name: path, offset: 0, type, littleEndian: true }]
  return type.members.map((member) => ({ ...member, name: `${path}.${member.name}` }))
}

const isText = ({ kind }: Hdf5Type): boolean => kind === "bytes" || kind === "strings" || kind === "enum"

const typeName = (type: Hdf5Type): string =>
  type.kind === "unread" ? type.what : isText(type) ? "text in an array of several axes" : type.kind

async function writeParts(
  received: Uint8Array,
  stride: number,
  parts: readonly Hdf5Member[],
  writers: readonly ColumnWriter[],
): Promise<void> {
  const count = received.length / stride
  // Aligned for doubles, which are then taken as they are.
  const bytes = received.byteOffset % 8 === 0 ? received : Uint8Array.from(received)
  let next = 0
  for (const { offset, type, littleEndian } of parts) {
    const elements = { bytes, offset, stride, count, littleEndian }
    if (type.kind === "bytes") await writeTexts("bytes", elements, type.size, textWriter(writers[next++]))
    else if (type.kind === "enum") {
      const texts = Array.from({ length: count }, (_, index) =>
        decodeValue(type, bytes, offset + index * stride, littleEndian),
      )
      await textWriter(writers[next++]).write(texts)
    } else if (type.kind === "complex")
      for (const half of [0, type.size / 2]) {
        const writer = numberWriter(writers[next++])
        await writer.write(decodeNumbers(`f${type.size / 2}`, { ...elements, offset: offset + half }, writer))
      }
    else {
      const writer = numberWriter(writers[next++])
      await writer.write(
        decodeNumbers(type.kind === "number" ? type.type : `u${type.size}`, elements, writer),
      )
    }
  }
}
