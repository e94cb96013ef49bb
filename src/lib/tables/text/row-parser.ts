import { scan, scanDouble } from "../numbers/scan-double"
import { delimiterText } from "./split-line"
import { type TextPlan } from "./text-plan"

const QUOTE = 34
const HASH = 35
const BRACKET = 40
/** Returned by {@link RowParser.parse} for a row that only the general splitter understands. */
export const NEEDS_SPLITTER = -1

/**
 * The fast way through a row without doubled quotes and brackets: plain numbers are put into the columns at once, every other
 * cell is noted as a range of bytes for the strict grammar. Nothing counts until the caller keeps the row.
 */
export class RowParser {
  /** Cells that need the grammar: field, start and end, `slow` of them. */
  slow = 0
  readonly slowField: Int32Array
  readonly slowStart: Int32Array
  readonly slowEnd: Int32Array
  /** 1 where the cell stood in quotes, which are cut off. */
  readonly slowQuoted: Uint8Array
  /** Start of a comment that ends the row, or -1. */
  commentAt = -1
  /** A decimal comma was seen that cannot group thousands. */
  commaProved = false
  /** Values with more digits than a double keeps, by field. */
  readonly longValues: Uint32Array
  readonly #delimiter: number
  readonly #blank: boolean
  readonly #mark: number
  readonly #fields: number
  /** 1 where plain numbers go straight into the column. */
  readonly #plain: Uint8Array

  constructor(plan: TextPlan) {
    const fields = plan.fields.length
    this.#fields = fields
    this.#blank = plan.delimiter === "blank"
    this.#delimiter = this.#blank ? 32 : delimiterText(plan.delimiter).charCodeAt(0)
    this.#mark = plan.decimal.charCodeAt(0)
    this.#plain = Uint8Array.from(plan.fields, ({ kind, thousands }) =>
      kind === "number" && !thousands ? 1 : 0,
    )
    this.slowField = new Int32Array(fields)
    this.slowStart = new Int32Array(fields)
    this.slowEnd = new Int32Array(fields)
    this.slowQuoted = new Uint8Array(fields)
    this.longValues = new Uint32Array(fields)
  }

  /**
   * Parses `bytes[start..end)` into `values[field][row]`.
   *
   * @returns the number of fields, or NEEDS_SPLITTER
   */
  parse(bytes: Uint8Array, start: number, end: number, values: readonly Float64Array[], row: number): number {
    const delimiter = this.#delimiter
    const blank = this.#blank
    const tab = delimiter === 9 ? -1 : 9
    let at = start
    let field = 0
    this.slow = 0
    this.commentAt = -1
    for (;;) {
      let byte = bytes[at]
      while (at < end && (byte === 32 || byte === tab)) byte = bytes[++at]
      if (at >= end) {
        if (blank) return field
        this.#note(field, at, at)
        return field + 1
      }
      if (byte === BRACKET) return NEEDS_SPLITTER
      if (byte === QUOTE) {
        at = this.#quoted(bytes, at + 1, end, field, values, row)
        if (at < 0) return NEEDS_SPLITTER
        field++
        if (at >= end) return field
        if (!blank) at++
        continue
      }
      if (blank && byte === HASH) {
        this.commentAt = at
        return field
      }
      const from = at
      if (field < this.#fields && this.#plain[field] === 1) {
        const value = scanDouble(bytes, at, end, this.#mark)
        at = scan.end
        if (at > from) {
          byte = bytes[at]
          const stop = at
          while (at < end && (byte === 32 || byte === tab)) byte = bytes[++at]
          const complete = at >= end || (blank ? at > stop : byte === delimiter)
          if (complete && this.#isOrdinary(value, field)) {
            values[field]![row] = value
            field++
            if (at >= end) return field
            if (!blank) at++
            continue
          }
          at = from
        }
      }
      at = this.#fieldEnd(bytes, at, end)
      if (at < 0) return NEEDS_SPLITTER
      this.#note(field, from, at)
      field++
      if (at >= end) return field
      if (!blank) at++
    }
  }

  /** A quoted field without quotes inside, from after its opening quote; returns where it ends, or -1. */
  #quoted(
    bytes: Uint8Array,
    start: number,
    end: number,
    field: number,
    values: readonly Float64Array[],
    row: number,
  ): number {
    let close = start
    while (close < end && bytes[close] !== QUOTE) close++
    if (close >= end || (close + 1 < end && bytes[close + 1] === QUOTE)) return -1
    const tab = this.#delimiter === 9 ? -1 : 9
    let at = close + 1
    while (at < end && (bytes[at] === 32 || bytes[at] === tab)) at++
    if (at < end && (this.#blank ? at === close + 1 : bytes[at] !== this.#delimiter)) return -1
    if (field < this.#fields && this.#plain[field] === 1) {
      const value = scanDouble(bytes, start, close, this.#mark)
      if (scan.end === close && close > start && this.#isOrdinary(value, field)) {
        values[field]![row] = value
        return at
      }
    }
    this.#note(field, start, close, 1)
    return at
  }

  #note(field: number, start: number, end: number, quoted: 0 | 1 = 0): void {
    if (field >= this.#fields) return
    this.slowQuoted[this.slow] = quoted
    this.slowField[this.slow] = field
    this.slowStart[this.slow] = start
    this.slowEnd[this.slow] = end
    this.slow++
  }

  /** Whether the value that was just scanned needs no second look: no overflow, underflow or integer too long. */
  #isOrdinary(value: number, field: number): boolean {
    if (scan.significant > 15) {
      if (scan.fraction < 0 && !scan.hasExponent) return false
      if (scan.significant > 17) this.longValues[field]!++
    }
    if (this.#mark !== 46 && scan.fraction >= 0) {
      const groups = scan.fraction === 3 && scan.whole <= 3 && !scan.hasExponent && Math.abs(value) >= 1
      if (!groups) this.commaProved = true
    }
    return value - value === 0 && (value !== 0 || scan.significant === 0)
  }

  /** End of a field, blanks after it included where a mark delimits; -1 at a blank outside ASCII. */
  #fieldEnd(bytes: Uint8Array, from: number, end: number): number {
    let at = from
    if (!this.#blank) {
      while (at < end && bytes[at] !== this.#delimiter) at++
      return at
    }
    for (; at < end; at++) {
      const byte = bytes[at]!
      if (byte === 32 || byte === 9) return at
      if (byte === 0xc2 || byte === 0xe2) return -1
    }
    return at
  }
}
