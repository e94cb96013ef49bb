import { byteText } from "../arrays/decode-elements"
import type { Hdf5Type } from "./hdf5-protocol"

/** One value as text. */
export function decodeValue(type: Hdf5Type, bytes: Uint8Array, at: number, littleEndian = true): string {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  switch (type.kind) {
    case "bytes":
      return byteText(bytes.subarray(at, at + type.size))
    case "boolean":
      return bytes[at] === 0 ? "false" : "true"
    case "complex":
      return `${floatAt(view, at, type.size / 2, littleEndian)}, ${floatAt(view, at + type.size / 2, type.size / 2, littleEndian)}`
    case "number":
      return type.type.startsWith("f")
        ? String(floatAt(view, at, type.size, littleEndian))
        : String(integerAt(view, at, type.type, littleEndian))
    case "enum": {
      const value = Number(integerAt(view, at, type.type, littleEndian))
      return type.names.find(([, each]) => each === value)?.[0] ?? String(value)
    }
    default:
      return ""
  }
}

const floatAt = (view: DataView, at: number, size: number, littleEndian: boolean): number =>
  size === 4 ? view.getFloat32(at, littleEndian) : view.getFloat64(at, littleEndian)

/** An integer of a type such as i4 or u8. */
function integerAt(view: DataView, at: number, type: string, littleEndian: boolean): bigint | number {
  switch (type) {
    case "i1":
      return view.getInt8(at)
    case "u1":
      return view.getUint8(at)
    case "i2":
      return view.getInt16(at, littleEndian)
    case "u2":
      return view.getUint16(at, littleEndian)
    case "i4":
      return view.getInt32(at, littleEndian)
    case "u4":
      return view.getUint32(at, littleEndian)
    case "i8":
      return view.getBigInt64(at, littleEndian)
    default:
      return view.getBigUint64(at, littleEndian)
  }
}
