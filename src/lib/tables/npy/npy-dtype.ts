import type { PythonLiteral } from "./python-literal"

/** How one field of an element is stored. */
export interface NpyField {
  /** "" for an array that is not structured. */
  readonly name: string
  readonly offset: number
  /** Bytes. */
  readonly size: number
  readonly littleEndian: boolean
  /** The type without byte order: f8, c16, U12 …; or null when it is not read, with the type as the file writes it. */
  readonly type: string | null
  readonly written: string
}

export interface NpyLayout {
  readonly fields: readonly NpyField[]
  /** Bytes of an element. */
  readonly size: number
  readonly structured: boolean
}

const sizes = new Map([
  ...["b1", "i1", "u1"].map((type) => [type, 1] as const),
  ...["f2", "i2", "u2"].map((type) => [type, 2] as const),
  ...["f4", "i4", "u4"].map((type) => [type, 4] as const),
  ...["f8", "i8", "u8", "c8"].map((type) => [type, 8] as const),
  ["c16", 16],
])
const SIMPLE = /^([<>|=])([a-zA-Z])(\d+)(\[.*\])?$/

/**
 * The layout of an element from its dtype. Types that are not read keep their place, so that the others can be; null
 * when the dtype has no size that can be told.
 */
export function npyLayout(dtype: PythonLiteral): NpyLayout | "npy-object" | null {
  if (!Array.isArray(dtype)) {
    const field = typeof dtype === "string" ? simpleField("", dtype, 0) : null
    return typeof field === "string" || field === null
      ? field
      : { fields: [field], size: field.size, structured: false }
  }
  const fields: NpyField[] = []
  let offset = 0
  for (const entry of dtype) {
    if (!Array.isArray(entry) || entry.length < 2) return null
    const [title, type, shape] = entry
    const name = Array.isArray(title) ? title.at(-1) : title
    if (typeof name !== "string") return null
    const repeats = Array.isArray(shape)
      ? shape.reduce<number>((product, length) => product * Number(length), 1)
      : 1
    const field = nestedField(name, type!, offset)
    if (typeof field === "string" || field === null) return field
    const whole = shape === undefined ? field : { ...field, size: field.size * repeats, type: null }
    if (!Number.isSafeInteger(whole.size) || whole.size < 0) return null
    // NumPy writes padding as a field without a name.
    if (name !== "" || !field.written.includes("V")) fields.push(whole)
    offset += whole.size
  }
  return offset > 0 ? { fields, size: offset, structured: true } : null
}

function nestedField(name: string, type: PythonLiteral, offset: number): NpyField | "npy-object" | null {
  if (typeof type === "string") return simpleField(name, type, offset)
  const inner = npyLayout(type)
  if (inner === null || inner === "npy-object") return inner
  return { name, offset, size: inner.size, littleEndian: true, type: null, written: "structure" }
}

function simpleField(name: string, written: string, offset: number): NpyField | "npy-object" | null {
  if (/^\|?O/.test(written)) return "npy-object"
  const match = SIMPLE.exec(written)
  if (!match) return null
  const [, order, letter, digits] = match
  const count = Number(digits)
  const known = sizes.get(`${letter}${count}`)
  const size = known ?? (letter === "U" ? 4 * count : count)
  if (!Number.isSafeInteger(size) || size > 1 << 20) return null
  const readable = known !== undefined || ((letter === "U" || letter === "S") && count > 0)
  return {
    name,
    offset,
    size,
    littleEndian: order !== ">",
    type: readable ? `${letter}${count}` : null,
    written,
  }
}

export const isTextType = (type: string): boolean => type.startsWith("U") || type.startsWith("S")
export const isComplexType = (type: string): boolean => type.startsWith("c")
