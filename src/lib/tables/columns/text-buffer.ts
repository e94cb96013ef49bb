import { ROWS_PER_PART } from "../intake-limits"
import type { TextChunk } from "../column-chunk"

const SMALLEST = 8192
const LARGEST_KEPT = 4 * 1024 * 1024

/** The texts of one part of a column while rows arrive. Rows are only ever appended. */
export class TextBuffer {
  #offsets = new Uint32Array(1025)
  #bytes = Buffer.alloc(SMALLEST)
  #valid: Uint8Array | null = null
  rows = 0

  /** UTF-8 bytes kept so far. */
  get length(): number {
    return this.#offsets[this.rows]!
  }

  append(text: string): void {
    const start = this.length
    // No UTF-16 unit takes more than three bytes.
    const most = start + 3 * text.length
    if (most > this.#bytes.length) {
      const larger = Buffer.alloc(Math.max(most, this.#bytes.length * 2))
      this.#bytes.copy(larger, 0, 0, start)
      this.#bytes = larger
    }
    this.#close(start + this.#bytes.write(text, start))
  }

  appendMissing(): void {
    this.#valid ??= new Uint8Array(ROWS_PER_PART / 8).fill(0xff)
    this.#valid[this.rows >> 3]! &= ~(1 << (this.rows & 7))
    this.#close(this.length)
  }

  #close(end: number): void {
    if (this.rows + 1 >= this.#offsets.length) {
      const larger = new Uint32Array(Math.min(ROWS_PER_PART, (this.#offsets.length - 1) * 4) + 1)
      larger.set(this.#offsets)
      this.#offsets = larger
    }
    this.#offsets[++this.rows] = end
  }

  chunk(): TextChunk {
    const valid = this.#valid?.subarray(0, Math.ceil(this.rows / 8)) ?? null
    if (valid && this.rows % 8 !== 0) valid[valid.length - 1]! &= (1 << (this.rows % 8)) - 1
    return {
      kind: "text",
      rows: this.rows,
      offsets: this.#offsets.subarray(0, this.rows + 1),
      bytes: this.#bytes.subarray(0, this.length),
      valid,
    }
  }

  clear(): void {
    this.rows = 0
    this.#valid = null
    // A part with long texts must not hold its memory for the rest of the file.
    if (this.#bytes.length > LARGEST_KEPT) this.#bytes = Buffer.alloc(SMALLEST)
  }
}
