import type { ColumnChunk } from "../column-chunk"
import { ROWS_PER_PART } from "../intake-limits"
import { NumberBuffer } from "./number-buffer"
import { NumberSummary } from "./number-summary"
import { TextBuffer } from "./text-buffer"
import { TextSummary } from "./text-summary"

/** Takes each part as it fills; the present arrays are used again afterwards. */
export type PartTaker = (part: number, chunk: ColumnChunk) => void | Promise<void>

/** Writes one column from values in any portions, as formats store them that keep columns apart. */
export class NumberWriter {
  readonly kind = "number"
  readonly summary: NumberSummary
  /** Integers that a double does not hold: how many, and the first as the file has it. */
  imprecise = 0
  firstImprecise: { readonly text: string; readonly value: number } | null = null
  readonly #buffer: NumberBuffer
  #row = 0
  #part = 0

  constructor(
    readonly columns: number,
    readonly sentinels: readonly number[],
    readonly take: PartTaker,
  ) {
    this.summary = new NumberSummary(columns)
    this.#buffer = new NumberBuffer()
  }

  /** @param missing tells which of the values are missing; NaN is a value */
  async write(values: Float64Array, missing?: (index: number) => boolean): Promise<void> {
    for (let at = 0; at < values.length;) {
      const length = Math.min(ROWS_PER_PART - this.#row, values.length - at)
      this.#buffer.values.set(values.subarray(at, at + length), this.#row)
      if (missing)
        for (let index = 0; index < length; index++)
          if (missing(at + index)) this.#buffer.markMissing(this.#row + index)
      this.#row += length
      at += length
      if (this.#row === ROWS_PER_PART) await this.#flush()
    }
  }

  /** A 64-bit integer as the nearest double; keeps count of those that change. */
  integer(value: bigint): number {
    const double = Number(value)
    if (BigInt(double) !== value) {
      this.imprecise++
      this.firstImprecise ??= { text: String(value), value: double }
    }
    return double
  }

  async end(): Promise<void> {
    if (this.#row > 0) await this.#flush()
  }

  async #flush(): Promise<void> {
    const values = this.#buffer.values.subarray(0, this.#row)
    for (const marker of this.sentinels)
      for (let row = values.indexOf(marker); row >= 0; row = values.indexOf(marker, row + 1))
        this.#buffer.markMissing(row)
    const chunk = this.summary.add(values, this.#buffer.validity(this.#row))
    this.#buffer.clear()
    this.#row = 0
    await this.take(this.#part++, chunk)
  }
}

/** The same for texts. */
export class TextWriter {
  readonly kind = "text"
  readonly summary = new TextSummary()
  readonly #buffer = new TextBuffer()
  #part = 0

  constructor(readonly take: PartTaker) {}

  async write(texts: readonly (string | null)[]): Promise<void> {
    for (const text of texts) {
      if (text === null) this.#buffer.appendMissing()
      else this.#buffer.append(text)
      if (this.#buffer.rows === ROWS_PER_PART) await this.#flush()
    }
  }

  /** UTF-8 bytes that wait for their part to fill. */
  get waiting(): number {
    return this.#buffer.length
  }

  async end(): Promise<void> {
    if (this.#buffer.rows > 0) await this.#flush()
  }

  async #flush(): Promise<void> {
    const chunk = this.summary.add(this.#buffer.chunk())
    this.#buffer.clear()
    await this.take(this.#part++, chunk)
  }
}

export type ColumnWriter = NumberWriter | TextWriter
