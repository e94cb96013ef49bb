import type { ColumnChunk } from "../column-chunk"
import type { IntakeJournal } from "../intake-journal"
import { isTimeName } from "../names/time-names"
import type { OutputColumn } from "./output-column"

/** How a column moves through the rows. */
export interface OrderFacts {
  readonly integers: boolean
  /** Never falls, except where something else begins anew. */
  readonly rises: boolean
  /** At most two values within each stretch over which time rises. */
  readonly steady: boolean
  /** Goes up by one where time begins anew. */
  readonly counts: boolean
}

const MAX_VALUES_OF_STEADY = 2
/** In a shorter table anything may look steady. */
const FEWEST_ROWS = 10

/**
 * Follows numeric columns row by row: which of them stay put while time rises, and where time falls although nothing
 * else begins anew. A column that keeps changing is dropped after a few rows, so that this costs little.
 */
export class OrderWatch {
  readonly #time: number
  readonly #numeric: readonly number[]
  readonly #previous: Float64Array
  /** Last value of a column that is still followed; missing values do not count as a change. */
  readonly #seen: Float64Array
  readonly #integers: boolean[]
  readonly #falls: Uint32Array
  /** Changes within the present stretch; the column is dropped at the third value. */
  readonly #changes: Uint8Array
  readonly #steady: boolean[]
  readonly #counts: boolean[]
  #alive: number[]
  #stretches = 0
  #rows = 0

  constructor(
    readonly outputs: readonly OutputColumn[],
    readonly journal: IntakeJournal,
  ) {
    const width = outputs.length
    this.#numeric = outputs.flatMap(({ kind, axes }, index) => (isNumeric(kind) && !axes ? [index] : []))
    this.#time = outputs.findIndex(
      ({ name, kind, told, axes }) =>
        kind === "number" && !axes && (told?.role ? told.role === "time" : isTimeName(name)),
    )
    this.#previous = new Float64Array(width).fill(NaN)
    this.#seen = new Float64Array(width).fill(NaN)
    this.#integers = outputs.map(() => true)
    this.#falls = new Uint32Array(width)
    this.#changes = new Uint8Array(width)
    this.#steady = outputs.map(() => true)
    this.#counts = outputs.map(() => true)
    this.#alive = this.#numeric.filter((index) => index !== this.#time)
  }

  /** Adds a part: the chunks of all columns, and the line of each row if there are lines. */
  add(chunks: readonly ColumnChunk[], lines: Uint32Array | null): void {
    const columns = chunks.map((chunk) => (chunk.kind === "number" ? chunk.values : null))
    const rows = chunks[0]?.rows ?? 0
    for (const index of this.#numeric) this.#order(index, columns[index]!)
    const time = this.#time >= 0 ? columns[this.#time]! : null
    let last = this.#time >= 0 && this.#rows > 0 ? this.#previous[this.#time]! : NaN
    for (let row = 0; row < rows; row++) {
      const now = time ? time[row]! : 0
      const fell = time !== null && now < last
      let began = this.#rows + row === 0
      if (this.#alive.length > 0) began = this.#follow(columns, row, fell) || began
      if (fell && !began && lines)
        this.journal.problem(
          "time-goes-back",
          { a: last, b: now, line: lines[row]! },
          { line: lines[row]!, column: this.outputs[this.#time]!.place },
        )
      if (now === now) last = now
    }
    this.#rows += rows
    for (const index of this.#numeric) this.#previous[index] = columns[index]![rows - 1]!
    if (this.#time >= 0) this.#previous[this.#time] = last
  }

  /** Falls and integers of one column in this part. */
  #order(index: number, values: Float64Array): void {
    let last = this.#previous[index]!
    let falls = 0
    let integers = this.#integers[index]!
    for (let row = 0; row < values.length; row++) {
      const value = values[row]!
      if (value < last) falls++
      if (value === value) {
        last = value
        if (integers && !Number.isInteger(value)) integers = false
      }
    }
    this.#falls[index]! += falls
    this.#integers[index] = integers
  }

  /** Looks for the beginning of something new: a column that stayed put changes. Returns whether there is one. */
  #follow(columns: readonly (Float64Array | null)[], row: number, fell: boolean): boolean {
    let began = false
    let dropped = false
    for (const index of this.#alive) {
      const value = columns[index]![row]!
      const before = this.#seen[index]!
      if (value === before || value !== value) continue
      this.#seen[index] = value
      if (before !== before) continue
      if (fell) {
        began = true
        if (value !== before + 1) this.#counts[index] = false
      } else {
        this.#counts[index] = false
        if (++this.#changes[index]! >= MAX_VALUES_OF_STEADY) {
          this.#steady[index] = false
          dropped = true
        }
      }
    }
    if (dropped) this.#alive = this.#alive.filter((index) => this.#steady[index]!)
    if (began) {
      this.#stretches++
      this.#changes.fill(0)
    }
    return began
  }

  factsOf(index: number): OrderFacts {
    const numeric = this.#numeric.includes(index)
    const enough = this.#rows >= FEWEST_ROWS && this.#rows >= 4 * (this.#stretches + 1)
    return {
      integers: numeric && this.#integers[index]!,
      rises: numeric && this.#falls[index]! <= this.#stretches,
      steady: numeric && enough && this.#steady[index]! && index !== this.#time,
      counts: numeric && this.#stretches > 0 && this.#counts[index]!,
    }
  }
}

const isNumeric = (kind: string): boolean => kind === "number" || kind === "boolean"
