import type { NumberWriter, TextWriter } from "../columns/column-writer"
import { halfDouble } from "../numbers/half-double"

/** Elements that lie at equal distances in bytes. */
export interface Elements {
  readonly bytes: Uint8Array
  /** Byte of the first value. */
  readonly offset: number
  /** Bytes from one value to the next. */
  readonly stride: number
  readonly count: number
  readonly littleEndian: boolean
}

const machineLittleEndian = new Uint8Array(new Uint16Array([1]).buffer)[0] === 1

type Get = (view: DataView, at: number, littleEndian: boolean) => number
const getters = new Map<string, Get>([
  ["f2", (view, at, le) => halfDouble(view.getUint16(at, le))],
  ["f4", (view, at, le) => view.getFloat32(at, le)],
  ["f8", (view, at, le) => view.getFloat64(at, le)],
  ["b1", (view, at) => (view.getUint8(at) === 0 ? 0 : 1)],
  ["i1", (view, at) => view.getInt8(at)],
  ["u1", (view, at) => view.getUint8(at)],
  ["i2", (view, at, le) => view.getInt16(at, le)],
  ["u2", (view, at, le) => view.getUint16(at, le)],
  ["i4", (view, at, le) => view.getInt32(at, le)],
  ["u4", (view, at, le) => view.getUint32(at, le)],
])

/**
 * Decodes numbers of a type such as f8, i4 or u8; parts of complex numbers are f4 or f8 at their own offset.
 *
 * @param writer told of 64-bit integers that a double does not hold
 */
export function decodeNumbers(type: string, elements: Elements, writer: NumberWriter): Float64Array {
  const { bytes, offset, stride, count, littleEndian } = elements
  const start = bytes.byteOffset + offset
  if (type === "f8" && littleEndian && machineLittleEndian && stride === 8 && start % 8 === 0)
    return new Float64Array(bytes.buffer, start, count)
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const values = new Float64Array(count)
  if (type === "i8" || type === "u8") {
    for (let index = 0, at = offset; index < count; index++, at += stride)
      values[index] = writer.integer(
        type === "i8" ? view.getBigInt64(at, littleEndian) : view.getBigUint64(at, littleEndian),
      )
    return values
  }
  const get = getters.get(type)
  if (!get) throw new TypeError(`No decoder for ${type}.`)
  for (let index = 0, at = offset; index < count; index++, at += stride)
    values[index] = get(view, at, littleEndian)
  return values
}

const latin = new TextDecoder("latin1")
const utf8 = new TextDecoder("utf-8", { fatal: true })

/** Texts of fixed length: bytes (UTF-8, else Latin-1) or UTF-32, filled up with zeros. */
export async function writeTexts(
  encoding: "bytes" | "utf-32",
  elements: Elements,
  size: number,
  writer: TextWriter,
): Promise<void> {
  const { bytes, offset, stride, count, littleEndian } = elements
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const texts = Array.from({ length: count }, (_, index) => {
    const at = offset + index * stride
    if (encoding === "bytes") return byteText(bytes.subarray(at, at + size))
    let text = ""
    for (let unit = 0; unit < size; unit += 4) {
      const code = view.getUint32(at + unit, littleEndian)
      text += code <= 0x10ffff ? String.fromCodePoint(code) : "\ufffd"
    }
    return text.replace(/\0+$/, "")
  })
  await writer.write(texts)
}

/** Bytes as text: up to the zeros that fill them up. */
export function byteText(bytes: Uint8Array): string {
  let end = bytes.length
  while (end > 0 && bytes[end - 1] === 0) end--
  const kept = bytes.subarray(0, end)
  try {
    return utf8.decode(kept)
  } catch (error) {
    if (error instanceof TypeError) return latin.decode(kept)
    throw error
  }
}
