import { ROWS_PER_PART } from "../intake-limits"
import type { TextChunk } from "../column-chunk"

const encoder = new TextEncoder()

/** The texts of one part of a column while rows arrive. Rows are only ever appended. */
export class TextBuffer {
  #offsets = new Uint32Array(1025)
  #bytes = new Uint8Array(8192)
  #valid: Uint8Array | null = null
  rows = 0

  /** UTF-8 bytes kept so far. */
  get length(): number {
    return this.#offsets[this.rows]!
  }

  append(text: string): void {
    this.appendBytes(encoder.encode(text))
  }

  appendBytes(text: Uint8Array): void {
    const end = this.length + text.length
    if (end > this.#bytes.length) {
      const larger = new Uint8Array(Math.max(end, this.#bytes.length * 2))
      larger.set(this.#bytes.subarray(0, this.length))
      this.#bytes = larger
    }
    this.#bytes.set(text, this.length)
    this.#close(end)
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
    if (this.#bytes.length > 4 * 1024 * 1024) this.#bytes = new Uint8Array(8192)
  }
}
