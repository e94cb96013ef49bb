import { ROWS_PER_PART } from "../intake-limits"

/**
 * The values of one part of a column while rows arrive. A row may be written again before it is kept; missing rows are
 * marked when they are.
 */
export class NumberBuffer {
  readonly values: Float64Array
  #valid: Uint8Array | null = null

  /** @param capacity rows that a part may have; memory that is never written is never taken */
  constructor(capacity = ROWS_PER_PART) {
    this.values = new Float64Array(capacity)
  }

  markMissing(row: number): void {
    this.#valid ??= new Uint8Array(ROWS_PER_PART / 8).fill(0xff)
    this.#valid[row >> 3]! &= ~(1 << (row & 7))
    this.values[row] = NaN
  }

  /** Validity of the first rows, null when all have values; unused bits of the last byte are zero. */
  validity(rows: number): Uint8Array | null {
    if (!this.#valid) return null
    const bits = this.#valid.subarray(0, Math.ceil(rows / 8))
    if (rows % 8 !== 0) bits[bits.length - 1]! &= (1 << (rows % 8)) - 1
    return bits
  }

  clear(): void {
    this.#valid = null
  }
}
