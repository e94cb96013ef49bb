import { IntakeRefusal } from "../intake-codes"
import type { IntakeLimits } from "../intake-limits"

/**
 * Cuts a stream of bytes into physical lines without copying them: LF, CR LF and CR end a line. A line is
 * `bytes[start..end)`; it may be joined with the following ones when a quote is open at its end.
 */
export class LineBuffer {
  bytes: Buffer = Buffer.allocUnsafe(1 << 20)
  start = 0
  end = 0
  /** Number of the line, of its first line when lines are joined. */
  line = 0
  /** Physical lines that the present one spans. */
  span = 1
  readonly ends = { lf: 0, crlf: 0, cr: 0 }
  readonly strayCarriageReturns: number[] = []
  hasFinalNewline = true
  #view: Buffer = this.bytes.subarray(0, 0)
  #next = 0
  #lf = -1
  #cr = -1
  #quote = -1
  /** Counts before the present line, restored when it is read again. */
  #before = { lf: 0, crlf: 0, cr: 0, stray: 0 }
  #ended = false

  constructor(readonly limits: IntakeLimits) {}

  /** Adds bytes. What the present line and all before it held is gone afterwards. */
  feed(piece: Uint8Array): void {
    const left = this.#view.length - this.#next
    if (left + piece.length > this.bytes.length) {
      const larger = Buffer.allocUnsafe(2 ** Math.ceil(Math.log2(left + piece.length)))
      this.bytes.copy(larger, 0, this.#next, this.#view.length)
      this.bytes = larger
    } else this.bytes.copyWithin(0, this.#next, this.#view.length)
    this.bytes.set(piece, left)
    this.#view = this.bytes.subarray(0, left + piece.length)
    this.#next = 0
    this.#lf = this.#cr = this.#quote = -1
  }

  /** No more bytes will come. Returns whether an end-of-file byte (1A) was cut off. */
  finish(): boolean {
    this.#ended = true
    const control = this.#view.length > this.#next && this.#view.at(-1) === 0x1a
    if (control) this.#view = this.#view.subarray(0, -1)
    return control
  }

  /** Moves to the next line; false when more bytes are needed or none are left. */
  advance(): boolean {
    const from = this.#next
    const before = this.#before
    before.lf = this.ends.lf
    before.crlf = this.ends.crlf
    before.cr = this.ends.cr
    before.stray = this.strayCarriageReturns.length
    const end = this.#lineEnd(from)
    if (end < 0) return false
    this.start = from
    this.end = end
    this.line += this.span
    this.span = 1
    return true
  }

  /** Joins the next line to the present one; false when more bytes are needed or none are left. */
  extend(): boolean {
    const end = this.#lineEnd(this.#next)
    if (end < 0) return false
    this.end = end
    this.span++
    return true
  }

  /** Steps back to before the present line, to read it again when more bytes have come. */
  rewind(): void {
    this.#next = this.start
    this.line -= 1
    this.span = 1
    this.#lf = this.#cr = this.#quote = -1
    const { lf, crlf, cr, stray } = this.#before
    Object.assign(this.ends, { lf, crlf, cr })
    this.strayCarriageReturns.length = stray
  }

  /** Whether the line holds a quote. */
  get hasQuote(): boolean {
    if (this.#quote < this.start) this.#quote = found(this.#view.indexOf(34, this.start))
    return this.#quote < this.end
  }

  get ended(): boolean {
    return this.#ended
  }

  get text(): string {
    return this.bytes.toString("utf8", this.start, this.end)
  }

  #lineEnd(from: number): number {
    const filled = this.#view.length
    if (from >= filled) return -1
    if (this.#lf < from) this.#lf = found(this.#view.indexOf(10, from))
    if (this.#cr < from) this.#cr = found(this.#view.indexOf(13, from))
    const end = Math.min(this.#lf, this.#cr, filled)
    if (end - from > this.limits.maxLineBytes) {
      const line = this.line + this.span
      throw new IntakeRefusal("line-too-long", { line, max: this.limits.maxLineBytes }, line)
    }
    if (end === filled) {
      if (!this.#ended) return -1
      this.hasFinalNewline = false
      this.#next = filled
    } else if (end === this.#cr) {
      if (end + 1 === filled && !this.#ended) return -1
      const pair = this.#lf === end + 1
      this.#count(pair ? "crlf" : "cr")
      this.#next = pair ? end + 2 : end + 1
    } else {
      this.#count("lf")
      this.#next = end + 1
    }
    return end
  }

  #count(kind: "lf" | "crlf" | "cr"): void {
    this.ends[kind]++
    if (kind === "cr" && this.strayCarriageReturns.length < this.limits.maxListed)
      this.strayCarriageReturns.push(this.line + this.span)
  }
}

const found = (at: number): number => (at < 0 ? Infinity : at)
