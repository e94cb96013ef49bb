import { NumberBuffer } from "../columns/number-buffer"
import { NumberSummary } from "../columns/number-summary"
import { isTimeName } from "../names/time-names"
import { type IntakeLimits, partRows } from "../intake-limits"
import { type TextPlan, plannedColumns } from "./text-plan"

/**
 * Counts the segments of a text table: blocks between blank lines, stretches between repeated headers, runs in which
 * time rises. Their number becomes the leading column when the plan has one.
 */
export class SegmentCounter {
  readonly numbers: NumberBuffer
  readonly summary = new NumberSummary(1)
  /** Number of the present segment. */
  segment = 0
  /** Two blank lines were seen between rows, whether or not the plan cares. */
  blocksSeen = false
  /** Field counts of blocks none of whose rows fit, by block. */
  readonly foreignBlocks = new Map<number, number>()
  readonly #timeField: number
  #lastTime = -Infinity
  #block = 0
  #blockPending = false
  #any = false
  #blockKept = false

  constructor(
    readonly plan: TextPlan,
    limits: IntakeLimits,
  ) {
    this.numbers = new NumberBuffer(partRows(plannedColumns(plan), limits))
    this.#timeField =
      plan.segments?.by === "time-goes-back" ? plan.fields.findIndex(({ name }) => isTimeName(name)) : -1
  }

  /** Whether the recipe leaves the present block out. */
  get excluded(): boolean {
    return this.plan.block !== null && this.#block !== this.plan.block
  }

  /** Block that the next row will belong to. */
  get upcoming(): number {
    return this.#block + (this.#blockPending ? 1 : 0)
  }

  /** Blank lines ended at a comment: the block begins with it if a row follows. */
  blankLinesBefore(run: number): void {
    if (run >= 2 && this.#any) this.#blockPending = true
  }

  afterBlankLines(run: number): void {
    if (!this.#any) {
      this.#any = true
      this.#blockPending = false
      return
    }
    const block = this.#blockPending || run >= 2
    this.#blockPending = false
    if (block) {
      this.blocksSeen = true
      this.#block++
      this.#blockKept = false
    }
    const { plan } = this
    if (
      (plan.segments?.by === "two-blank-lines" && block) ||
      (plan.segments?.by === "blank-line" && run >= 1)
    )
      this.segment++
  }

  headerRepeated(): void {
    if (this.plan.segments?.by === "repeated-header") this.segment++
  }

  setAside(fields: number): void {
    if (!this.#blockKept) this.foreignBlocks.set(this.#block, fields)
  }

  keep(row: number, values: readonly Float64Array[]): void {
    if (!this.#blockKept) {
      this.#blockKept = true
      this.foreignBlocks.delete(this.#block)
    }
    if (!this.plan.segments) return
    if (this.#timeField >= 0) {
      const time = values[this.#timeField]![row]!
      if (time < this.#lastTime) this.segment++
      this.#lastTime = time
    }
    this.numbers.values[row] = this.segment
  }
}
