import { type NumberChunk, isValid } from "../column-chunk"
import type { CellValue, ColumnReading } from "../table-reading"
import { SketchBuilder } from "./distribution-sketch"
import { SentinelWatch } from "./sentinel-watch"

type Summary = Pick<
  ColumnReading,
  | "count"
  | "sum"
  | "min"
  | "max"
  | "nanCount"
  | "infCount"
  | "missingCount"
  | "firstValues"
  | "distinctCount"
  | "distinctCapped"
  | "sketch"
>

export const FIRST_VALUES = 5
/** Different values are counted up to here, in a wide table to less: the columns share the memory. */
export const DISTINCT_CAP = 1000
const DISTINCT_IN_TABLE = 200_000

/** A double as JSON can hold it. */
export const cellValue = (value: number): CellValue => (Number.isFinite(value) ? value : String(value))

/** Sums up a number column part by part. */
export class NumberSummary {
  readonly sentinels = new SentinelWatch()
  #count = 0
  #sum = 0
  /** What rounding took from the sum: A. Neumaier, Z. Angew. Math. Mech. 54, 39 (1974). */
  #lost = 0
  #min = Infinity
  #max = -Infinity
  #nans = 0
  #infinities = 0
  #missing = 0
  #first: CellValue[] = []
  readonly #distinct = new Set<number>()
  readonly #distinctCap: number
  readonly #sketch = new SketchBuilder()

  /** @param columns columns of the table */
  constructor(columns: number) {
    this.#distinctCap = Math.min(DISTINCT_CAP, Math.ceil(DISTINCT_IN_TABLE / columns))
  }

  /** Adds a part and returns it as the chunk to store. */
  add(values: Float64Array, valid: Uint8Array | null): NumberChunk {
    const rows = values.length
    for (let row = 0; row < rows && this.#first.length < FIRST_VALUES; row++)
      this.#first.push(isValid(valid, row) ? cellValue(values[row]!) : null)
    let min = Infinity
    let max = -Infinity
    let sum = this.#sum
    let lost = this.#lost
    let empty = 0
    for (let row = 0; row < rows; row++) {
      const value = values[row]!
      // x - x is NaN for NaN and both infinities.
      if (value - value !== 0) {
        empty++
        continue
      }
      if (value < min) min = value
      if (value > max) max = value
      const next = sum + value
      lost += Math.abs(sum) >= Math.abs(value) ? sum - next + value : value - next + sum
      sum = next
    }
    const nanCount = empty === 0 ? 0 : this.#addEmpty(values, valid)
    this.#count += rows
    this.#sum = sum
    this.#lost = lost
    if (min < this.#min) this.#min = min
    if (max > this.#max) this.#max = max
    if (min <= max) {
      this.#sketch.cover(min, max)
      for (let row = 0; row < rows; row++)
        if (values[row]! - values[row]! === 0) this.#sketch.add(values[row]!)
      this.sentinels.add(values, min, max)
    }
    this.#addDistinct(values)
    return {
      kind: "number",
      rows,
      values,
      valid,
      min: min <= max ? min : null,
      max: min <= max ? max : null,
      nanCount,
    }
  }

  #addEmpty(values: Float64Array, valid: Uint8Array | null): number {
    let nans = 0
    for (let row = 0; row < values.length; row++) {
      const value = values[row]!
      if (value - value === 0) continue
      if (!isValid(valid, row)) this.#missing++
      else if (Number.isNaN(value)) nans++
      else this.#infinities++
    }
    this.#nans += nans
    return nans
  }

  #addDistinct(values: Float64Array): void {
    let previous = NaN
    for (let row = 0; row < values.length && this.#distinct.size <= this.#distinctCap; row++) {
      const value = values[row]!
      if (value !== previous && !Number.isNaN(value)) this.#distinct.add(value)
      previous = value
    }
  }

  get summary(): Summary {
    const some = this.#min <= this.#max
    const sum = this.#sum + this.#lost
    return {
      count: this.#count,
      sum: Number.isFinite(sum) ? sum : null,
      min: some ? this.#min : null,
      max: some ? this.#max : null,
      nanCount: this.#nans,
      infCount: this.#infinities,
      missingCount: this.#missing,
      firstValues: this.#first,
      distinctCount: Math.min(this.#distinct.size, this.#distinctCap),
      distinctCapped: this.#distinct.size > this.#distinctCap,
      sketch: some ? this.#sketch.shown(this.#min, this.#max) : null,
    }
  }
}
