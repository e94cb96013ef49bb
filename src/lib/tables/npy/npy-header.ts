import type { PieceReader } from "../source/piece-reader"
import { type PythonLiteral, pythonLiteral } from "./python-literal"

export interface NpyHeader {
  /** dtype as NumPy writes it: a string, or a list of fields. */
  readonly dtype: PythonLiteral
  readonly shape: readonly number[]
  readonly fortran: boolean
  /** Bytes of magic, version and header. */
  readonly length: number
}

const LONGEST_HEADER = 1024 * 1024

/**
 * Reads the header of an NPY stream, versions 1 to 3. Nothing in it is evaluated.
 *
 * @returns a code of the catalogue when it is not one
 * @see NumPy Enhancement Proposal 1, numpy.lib.format
 */
export async function npyHeader(reader: PieceReader): Promise<NpyHeader | "npy-header" | "npy-version"> {
  const start = await reader.take(8)
  if (start.length < 8 || start.toString("latin1", 0, 6) !== "\x93NUMPY") return "npy-header"
  const version = start[6]!
  if (version < 1 || version > 3) return "npy-version"
  const lengthBytes = await reader.take(version === 1 ? 2 : 4)
  if (lengthBytes.length < (version === 1 ? 2 : 4)) return "npy-header"
  const length = version === 1 ? lengthBytes.readUInt16LE() : lengthBytes.readUInt32LE()
  if (length > LONGEST_HEADER) return "npy-header"
  const text = await reader.take(length)
  if (text.length < length) return "npy-header"
  const literal = pythonLiteral(text.toString(version === 3 ? "utf8" : "latin1"))?.value
  if (!(literal instanceof Map)) return "npy-header"
  const shape = literal.get("shape")
  const fortran = literal.get("fortran_order")
  const dtype = literal.get("descr")
  if (!isShape(shape) || typeof fortran !== "boolean" || dtype === undefined) return "npy-header"
  return { dtype, shape, fortran, length: 8 + lengthBytes.length + length }
}

const isShape = (value: PythonLiteral | undefined): value is number[] =>
  Array.isArray(value) &&
  value.length <= 32 &&
  value.every((length) => typeof length === "number" && Number.isSafeInteger(length) && length >= 0)
