import { type TextChunk, isValid } from "../column-chunk"
import type { CellValue, ColumnReading } from "../table-reading"
import { DISTINCT_CAP, FIRST_VALUES } from "./number-summary"

const decoder = new TextDecoder()
/** Longest text that a summary repeats. */
const MAX_SHOWN = 200

/** Sums up a text column part by part. */
export class TextSummary {
  #count = 0
  #missing = 0
  #first: CellValue[] = []
  readonly #distinct = new Set<string>()

  add(chunk: TextChunk): TextChunk {
    this.#count += chunk.rows
    for (let row = 0; row < chunk.rows; row++) {
      const wanted = this.#first.length < FIRST_VALUES
      if (!isValid(chunk.valid, row)) {
        this.#missing++
        if (wanted) this.#first.push(null)
      } else if (wanted || this.#distinct.size <= DISTINCT_CAP) {
        const text = decoder.decode(chunk.bytes.subarray(chunk.offsets[row], chunk.offsets[row + 1]))
        if (wanted) this.#first.push(text.slice(0, MAX_SHOWN))
        this.#distinct.add(text)
      }
    }
    return chunk
  }

  get summary() {
    return {
      count: this.#count,
      sum: null,
      min: null,
      max: null,
      nanCount: 0,
      infCount: 0,
      missingCount: this.#missing,
      firstValues: this.#first,
      distinctCount: Math.min(this.#distinct.size, DISTINCT_CAP),
      distinctCapped: this.#distinct.size > DISTINCT_CAP,
      sketch: null,
    } satisfies Partial<ColumnReading>
  }
}
