import { hexDouble } from "./hex-double"

/** What one cell says. `note` and `code` are codes of the intake catalogue. */
export type Cell =
  | { readonly kind: "missing"; readonly word: string }
  | { readonly kind: "number"; readonly value: number; readonly code?: CellProblem; readonly note?: CellNote }
  | { readonly kind: "complex"; readonly re: number; readonly im: number }
  | { readonly kind: "boolean"; readonly value: 0 | 1 }
  | { readonly kind: "datetime" }
  | { readonly kind: "bad"; readonly code: CellProblem }

export type CellProblem =
  "not-a-number" | "overflow-stars" | "thousands-separator" | "integer-precision" | "overflow" | "underflow"
export type CellNote =
  "fortran-exponent" | "missing-exponent-letter" | "hex-float" | "unicode-minus" | "digits-beyond-double"

export interface CellStyle {
  readonly decimal: "." | ","
  /** The mark that groups digits in this column, once the user has said so. */
  readonly thousands?: ThousandsMark | null
}
export type ThousandsMark = "," | "." | " " | "'"

const missingWords = new Set(["", "na", "n/a", "null", "none", "-", "--", "---", "?"])

// \d+(\.\d*)? and not \d+\.?\d*: the latter takes quadratic time on a long run of digits that ends in a letter.
const MANTISSA = String.raw`(?:\d+(?:\.\d*)?|\.\d+)`
const UNSIGNED = String.raw`${MANTISSA}(?:[eE][+-]?\d+)?`
/** No number that a program prints is longer; what is longer is text. */
const LONGEST_NUMBER = 1200
const DECIMAL = new RegExp(`^[+-]?${UNSIGNED}$`)
const FORTRAN = new RegExp(String.raw`^([+-]?${MANTISSA})[dDqQ]([+-]?\d+)$`)
/** Fortran drops the letter when the exponent takes three digits. */
const NO_LETTER = /^([+-]?(?:\d+\.\d*|\.\d+))([+-]\d{3})$/
/** Everything but a word: signs, digits, points, brackets, stars, and the n and i of nan and inf. */
const NUMBER_START = /^[\d+\-.,(*nNiI\u2212]/
const NAN = /^(?:[+-]?nan(?:\(.*\))?|[+-]?1\.#(?:qnan|snan|ind))$/i
const INFINITE = /^([+-]?)(?:inf|infinity|1\.#inf)$/i
const COMPLEX = new RegExp(String.raw`^\(?\s*([+-]?${UNSIGNED})\s*(\+?-|\+)\s*(${UNSIGNED})\*?[ijIJ]\)?$`)
const COMPLEX_PAIR = new RegExp(String.raw`^\(\s*([+-]?${UNSIGNED})\s*,\s*([+-]?${UNSIGNED})\s*\)$`)
const BOOLEAN = /^(?:t|f|true|false|\.true\.|\.false\.)$/i
const DATE = String.raw`\d{4}-(?:0[1-9]|1[0-2])-(?:0[1-9]|[12]\d|3[01])`
const TIME = String.raw`(?:[01]\d|2[0-4]):[0-5]\d(?::[0-6]\d(?:[.,]\d+)?)?`
const DATETIME = new RegExp(`^(?:${DATE}(?:[T ]${TIME}(?:Z|[+-]\\d{2}:?\\d{2})?)?|${TIME})$`)

/**
 * Groups of three digits, whole, with an optional fraction. No decimal-comma cell such as 1,5 fits. The groups must all
 * use one mark.
 */
const GROUPED = /^[+-]?\d{1,3}(?:([,.' ])\d{3})(?:\1\d{3})*(?:[.,]\d+)?$/

/**
 * Reads a cell by the one grammar for numbers: the form first, then the value, so that nothing slips through a lenient
 * conversion (`Number("")` is 0, `parseFloat("1.6e")` is 1.6).
 *
 * @param text the cell without blanks around it
 * @see docs/intake.md, Cells
 * @example readCell("1.5D-3", { decimal: "." }) // { kind: "number", value: 0.0015, note: "fortran-exponent" }
 */
export function readCell(text: string, style: CellStyle): Cell {
  if (text.length <= 4 && missingWords.has(text.toLowerCase())) return { kind: "missing", word: text }
  if (text.length > LONGEST_NUMBER) return { kind: "bad", code: "not-a-number" }
  if (!NUMBER_START.test(text)) return wordCell(text)
  const minus = text.includes("\u2212")
  const plain = minus ? text.replace(/\u2212(?=[\d.])/g, "-") : text
  const pointed = withPoint(plain, style)
  if (pointed !== null && DECIMAL.test(pointed)) return decimalCell(pointed, minus)
  return specialNumber(pointed ?? plain, style) ?? otherCell(plain, style)
}

/** The text with a decimal point; null when its marks do not fit the style, as 1.5 under a decimal comma. */
function withPoint(text: string, style: CellStyle): string | null {
  const { decimal, thousands } = style
  if (thousands && GROUPED.exec(text)?.[1] === thousands && thousands !== decimal)
    return text.replaceAll(thousands, "").replace(",", ".")
  if (decimal === "." || text.startsWith("(")) return text
  if (/\d\.|\.\d/.test(text) || /,(?!\d)/.test(text)) return null
  return /^[^,]*,[^,]*$/.test(text) ? text.replace(",", ".") : text
}

function decimalCell(text: string, minus: boolean): Cell {
  const value = Number(text)
  if (!Number.isFinite(value)) return { kind: "bad", code: "overflow" }
  const mantissa = text.replace(/[eE].*$/, "")
  if (value === 0 && /[1-9]/.test(mantissa)) return { kind: "bad", code: "underflow" }
  const digits = mantissa.replace(/[+.-]/g, "").replace(/^0+/, "")
  if (digits.length > 15 && /^[+-]?\d+$/.test(text) && BigInt(text.replace("+", "")) !== BigInt(value))
    return { kind: "number", value, code: "integer-precision" }
  if (minus) return { kind: "number", value, note: "unicode-minus" }
  return digits.length > 17
    ? { kind: "number", value, note: "digits-beyond-double" }
    : { kind: "number", value }
}

function specialNumber(text: string, style: CellStyle): Cell | null {
  const noted = (digits: string, note: CellNote): Cell => {
    const cell = decimalCell(digits, false)
    return cell.kind === "number" ? { ...cell, note } : cell
  }
  let match = FORTRAN.exec(text)
  if (match) return noted(`${match[1]}e${match[2]}`, "fortran-exponent")
  match = NO_LETTER.exec(text)
  if (match) return noted(`${match[1]}e${match[2]}`, "missing-exponent-letter")
  const hex = hexDouble(text)
  if (hex !== null) return { kind: "number", value: hex, note: "hex-float" }
  if (NAN.test(text)) return { kind: "number", value: NaN }
  match = INFINITE.exec(text)
  if (match) return { kind: "number", value: match[1] === "-" ? -Infinity : Infinity }
  match = COMPLEX.exec(text)
  if (match) return complexCell(match[1]!, `${match[2]!.includes("-") ? "-" : ""}${match[3]}`)
  match = style.decimal === "." ? COMPLEX_PAIR.exec(text) : null
  return match ? complexCell(match[1]!, match[2]!) : null
}

function complexCell(reText: string, imText: string): Cell {
  const re = decimalCell(reText, false)
  const im = decimalCell(imText, false)
  if (re.kind === "bad") return re
  if (im.kind === "bad") return im
  return { kind: "complex", re: Number(reText), im: Number(imText) }
}

function wordCell(text: string): Cell {
  if (BOOLEAN.test(text)) return { kind: "boolean", value: /^\.?t/i.test(text) ? 1 : 0 }
  return { kind: "bad", code: "not-a-number" }
}

function otherCell(text: string, style: CellStyle): Cell {
  if (/^\*+$/.test(text)) return { kind: "bad", code: "overflow-stars" }
  const word = wordCell(text)
  if (word.kind === "boolean") return word
  if (DATETIME.test(text)) return { kind: "datetime" }
  const mixedMarks = style.decimal === "." ? /^[+-]?\d+,\d+$/ : /^[+-]?\d+\.\d+$/
  const grouped = GROUPED.test(text.replace(/[\u00a0\u202f\u2009]/g, " ")) || mixedMarks.test(text)
  return { kind: "bad", code: grouped ? "thousands-separator" : "not-a-number" }
}
