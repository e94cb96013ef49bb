import type { ColumnChunk, TextChunk } from "../column-chunk"
import type { IntakeJournal } from "../intake-journal"
import { isTimeName } from "../names/time-names"
import { isTrajectoryName } from "../names/trajectory-names"
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
/** A column that falls more often than at every fourth row is no time. */
const MOST_FALLS = 1 / 4

/**
 * Follows columns row by row: which of them stay put while time rises, and where time falls although nothing else begins
 * anew. A new stretch begins where the trajectory changes, or where time falls and a column changes that had stayed put.
 * A column that keeps changing is dropped after a few rows, so that this costs little.
 */
export class OrderWatch {
  readonly #time: number
  readonly #trajectory: number
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
  /** Columns that are still followed. */
  #alive: number[]
  #stretches = 0
  #stretchRows = 0
  #rows = 0
  readonly #unexplained: { readonly from: number; readonly to: number; readonly line: number }[] = []
  #unexplainedCount = 0

  constructor(
    readonly outputs: readonly OutputColumn[],
    readonly journal: IntakeJournal,
  ) {
    const width = outputs.length
    const find = (test: (output: OutputColumn) => boolean) =>
      outputs.findIndex((output) => !output.axes && test(output))
    this.#numeric = outputs.flatMap(({ kind, axes }, index) => (isNumeric(kind) && !axes ? [index] : []))
    this.#time = find(
      ({ name, kind, told }) => kind === "number" && (told?.role ? told.role === "time" : isTimeName(name)),
    )
    this.#trajectory = find(({ name, told }) =>
      told?.role ? told.role === "trajectory" : isTrajectoryName(name),
    )
    this.#previous = new Float64Array(width).fill(NaN)
    this.#seen = new Float64Array(width).fill(NaN)
    this.#integers = outputs.map(() => true)
    this.#falls = new Uint32Array(width)
    this.#changes = new Uint8Array(width)
    this.#steady = outputs.map(() => true)
    this.#counts = outputs.map(() => true)
    this.#alive = outputs.flatMap(({ axes }, index) => (index === this.#time || axes ? [] : [index]))
  }

  /** Adds a part: the chunks of all columns, and the line of each row if there are lines. */
  add(chunks: readonly ColumnChunk[], lines: Uint32Array | null): void {
    const alive = new Set(this.#alive)
    const columns = chunks.map((chunk, index) =>
      chunk.kind === "number" ? chunk.values : alive.has(index) ? textMarks(chunk) : null,
    )
    const rows = chunks[0]?.rows ?? 0
    for (const index of this.#numeric) this.#order(index, columns[index]!)
    const time = this.#time >= 0 ? columns[this.#time]! : null
    let last = this.#time >= 0 ? this.#previous[this.#time]! : NaN
    for (let row = 0; row < rows; row++) {
      const now = time ? time[row]! : 0
      const fell = time !== null && now < last
      const began = this.#alive.length > 0 && this.#follow(columns, row, fell)
      if (fell && !began && lines) this.#keepFall(last, now, lines[row]!)
      if (now === now) last = now
    }
    this.#rows += rows
    for (const index of this.#numeric) this.#previous[index] = columns[index]![rows - 1]!
    if (this.#time >= 0) this.#previous[this.#time] = last
  }

  /** Lists where time falls within a trajectory, unless it falls so often that the column is no time. */
  finish(): void {
    if (this.#time < 0) return
    const { place, told } = this.outputs[this.#time]!
    if (told?.role !== "time" && this.#falls[this.#time]! > MOST_FALLS * this.#rows) return
    for (const { from, to, line } of this.#unexplained)
      this.journal.problem("time-goes-back", { a: from, b: to, line }, { line, column: place })
    this.journal.more("time-goes-back", this.#unexplainedCount - this.#unexplained.length)
  }

  #keepFall(from: number, to: number, line: number): void {
    this.#unexplainedCount++
    if (this.#unexplained.length < this.journal.maxListed) this.#unexplained.push({ from, to, line })
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

  /** Whether a new stretch begins at this row. */
  #follow(columns: readonly (Float64Array | null)[], row: number, fell: boolean): boolean {
    let began = false
    let dropped = false
    for (const index of this.#alive) {
      const value = columns[index]![row]!
      const before = this.#seen[index]!
      if (value === before || value !== value) continue
      this.#seen[index] = value
      if (before !== before) continue
      const stayed = this.#stretchRows > 1 && this.#changes[index] === 0
      if (index === this.#trajectory || (fell && stayed)) {
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
      this.#stretchRows = 0
      this.#changes.fill(0)
    }
    this.#stretchRows++
    return began
  }

  factsOf(index: number): OrderFacts {
    const numeric = this.#numeric.includes(index)
    const enough = this.#rows >= FEWEST_ROWS && this.#rows >= 4 * (this.#stretches + 1)
    return {
      integers: numeric && this.#integers[index]!,
      rises: numeric && this.#falls[index]! <= this.#stretches + this.#rows / 10,
      steady: numeric && enough && this.#steady[index]! && index !== this.#time,
      counts: numeric && this.#stretches > 0 && this.#counts[index]!,
    }
  }
}

const isNumeric = (kind: string): boolean => kind === "number" || kind === "boolean"

/** A number for each text, the same for the same text: enough to see where a column changes. */
function textMarks({ rows, offsets, bytes }: TextChunk): Float64Array {
  const marks = new Float64Array(rows)
  for (let row = 0; row < rows; row++) {
    let mark = 0x811c9dc5
    for (let at = offsets[row]!; at < offsets[row + 1]!; at++) mark = Math.imul(mark ^ bytes[at]!, 0x01000193)
    marks[row] = mark
  }
  return marks
}
