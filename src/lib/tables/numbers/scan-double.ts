import { LARGEST_TABLE_EXPONENT, exactPowers, powerHigh, powerLow } from "./power-of-ten-table"

/** What the last call of {@link scanDouble} saw; one object for all calls, because this runs once a cell. */
export const scan = {
  /** Index after the last byte of the number; equal to the start when there is none. */
  end: 0,
  /** Digits from the first that is not zero. */
  significant: 0,
  /** Digits before the decimal mark. */
  whole: 0,
  /** Digits after the decimal mark, -1 when there is no mark. */
  fraction: -1,
  hasExponent: false,
}

const POINT = 46
/** 2^27 + 1 splits a double into two halves of 26 bits. */
const SPLITTER = 134217729
/** Bound on the relative error of the two-double product below; each of its five roundings is under 2^-102. */
const PRODUCT_ERROR = 2 ** -98

/**
 * The double nearest to the decimal number that starts at `start`: `[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?` with `mark`
 * as decimal mark. Bit for bit what `Number` gives for the same text; it makes no string on the common paths. Stops at
 * the first byte that cannot belong to the number; the caller checks what follows `scan.end`.
 *
 * @param bytes UTF-8 or any superset of ASCII
 * @param limit index after the last byte that may be read
 * @param mark byte of the decimal mark, 46 or 44
 * @see W. D. Clinger, How to read floating point numbers accurately, PLDI 1990 (exact small powers); T. J. Dekker,
 *   Numer. Math. 18, 224 (1971) (products as sums of two doubles)
 */
export function scanDouble(bytes: Uint8Array, start: number, limit: number, mark = POINT): number {
  let at = start
  const first = bytes[at]
  if (first === 45 || first === 43) at++
  let head = 0
  let headDigits = 0
  let next = 0
  let nextDigits = 0
  let dropped = 0
  let digits = 0
  let beforeMark = -1
  for (; at < limit; at++) {
    const digit = bytes[at]! - 48
    if (digit >= 0 && digit <= 9) {
      digits++
      if (headDigits < 15) {
        if (headDigits > 0 || digit > 0) {
          head = head * 10 + digit
          headDigits++
        }
      } else if (nextDigits < 4) {
        next = next * 10 + digit
        nextDigits++
      } else dropped++
    } else if (digit + 48 === mark && beforeMark < 0) beforeMark = digits
    else break
  }
  if (digits === 0) {
    scan.end = start
    return NaN
  }
  scan.fraction = beforeMark < 0 ? -1 : digits - beforeMark
  scan.whole = beforeMark < 0 ? digits : beforeMark
  scan.significant = headDigits + nextDigits + dropped
  scan.hasExponent = false
  let exponent = beforeMark < 0 ? 0 : beforeMark - digits
  scan.end = at
  if (at < limit && (bytes[at]! | 32) === 101) {
    let p = at + 1
    const down = bytes[p] === 45
    if (down || bytes[p] === 43) p++
    const from = p
    let power = 0
    for (; p < limit; p++) {
      const digit = bytes[p]! - 48
      if (!(digit >= 0 && digit <= 9)) break
      // Past 10^7 only the sign matters, unless the mantissa is as long as a file: then Number decides below.
      if (power < 1e7) power = power * 10 + digit
    }
    if (p > from) {
      exponent += down ? -power : power
      scan.hasExponent = true
      scan.end = p
    }
  }
  if (head === 0) return first === 45 ? -0 : 0
  if (dropped === 0) {
    const value = fromParts(head, next, nextDigits, exponent)
    if (value > 0) return first === 45 ? -value : value
  }
  return Number(textOf(bytes, start, scan.end, mark))
}

/** head x 10^nextDigits + next, times 10^exponent; 0 when the rounding could not be proved. */
function fromParts(head: number, next: number, nextDigits: number, exponent: number): number {
  if (nextDigits === 0) {
    if (exponent >= 0 && exponent <= 22) return head * exactPowers[exponent]!
    if (exponent < 0 && exponent >= -22) return head / exactPowers[-exponent]!
  }
  if (exponent < -LARGEST_TABLE_EXPONENT || exponent > LARGEST_TABLE_EXPONENT) return 0
  let high = head
  let low = 0
  if (nextDigits > 0) {
    // The factor has at most 14 bits, so it needs no split.
    const factor = exactPowers[nextDigits]!
    high = head * factor
    const spread = SPLITTER * head
    const upper = spread - (spread - head)
    low = upper * factor - high + (head - upper) * factor + next
  }
  const power = powerHigh[exponent + LARGEST_TABLE_EXPONENT]!
  const product = high * power
  const spreadA = SPLITTER * high
  const a = spreadA - (spreadA - high)
  const b = high - a
  const spreadB = SPLITTER * power
  const c = spreadB - (spreadB - power)
  const d = power - c
  const error = a * c - product + a * d + b * c + b * d
  const tail = error + (high * powerLow[exponent + LARGEST_TABLE_EXPONENT]! + low * power)
  const value = product + tail
  const rest = tail - (value - product)
  const bound = value * PRODUCT_ERROR
  const proved = value + (rest + bound) === value && value + (rest - bound) === value
  return proved && value < 1e300 && value > 1e-280 ? value : 0
}

const decoder = new TextDecoder("latin1")

function textOf(bytes: Uint8Array, start: number, end: number, mark: number): string {
  const text = decoder.decode(bytes.subarray(start, end))
  return mark === POINT ? text : text.replace(String.fromCharCode(mark), ".")
}
