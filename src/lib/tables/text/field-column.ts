import type { IntakeCodeName, SentenceValues } from "../intake-codes"
import { type Cell, type CellNote, type CellStyle, readCell } from "../numbers/read-cell"
import { NumberBuffer } from "../columns/number-buffer"
import { NumberSummary } from "../columns/number-summary"
import { TextBuffer } from "../columns/text-buffer"
import { TextSummary } from "../columns/text-summary"
import { type KindCounts, countCell, noCounts } from "./column-evidence"
import { type IntakeLimits, partRows } from "../intake-limits"
import type { FieldPlan } from "./text-plan"

/** Told of a cell that is listed as a problem. */
export type CellReport = (code: IntakeCodeName, text: string, values?: SentenceValues) => void

/**
 * One field of the rows on its way into one column, or two when it is complex. Cells that are not plain numbers come
 * through `keep`; what they say is counted, so that the whole file can overrule its sample.
 */
export class FieldColumn {
  readonly numbers: NumberBuffer
  readonly imaginary: NumberBuffer | null
  readonly texts: TextBuffer | null
  readonly summary: NumberSummary
  readonly imaginarySummary: NumberSummary
  readonly textSummary = new TextSummary()
  /** What the cells outside the fast way said. */
  readonly counts: KindCounts = noCounts()
  /** Cells outside the fast way, missing ones included. */
  slowCells = 0
  readonly notes = new Map<CellNote, number>()
  readonly missingWords = new Map<string, number>()
  #lastText = ""
  #lastCell: Cell = { kind: "missing", word: "" }

  constructor(
    readonly plan: FieldPlan,
    readonly style: CellStyle,
    /** Columns of the table, which share the memory. */
    columns: number,
    limits: IntakeLimits,
  ) {
    const rows = partRows(columns, limits)
    this.numbers = new NumberBuffer(rows)
    this.imaginary = plan.kind === "complex" ? new NumberBuffer(rows) : null
    this.summary = new NumberSummary(columns)
    this.imaginarySummary = new NumberSummary(columns)
    this.texts = plan.kind === "text" || plan.kind === "datetime" ? new TextBuffer() : null
  }

  /** Keeps a cell of a row that is being kept. */
  keep(text: string, row: number, report: CellReport): void {
    this.slowCells++
    if (text === "") return this.#missing(row)
    const cell = this.#read(text)
    countCell(this.counts, cell)
    if (this.texts) return this.#keepText(cell, text, row)
    if (cell.kind === "missing") {
      this.missingWords.set(cell.word, (this.missingWords.get(cell.word) ?? 0) + 1)
      return this.#missing(row)
    }
    if (this.plan.kind === "boolean" && cell.kind === "boolean") {
      this.numbers.values[row] = cell.value
      return
    }
    if (cell.kind === "number" && this.plan.kind !== "boolean") {
      this.numbers.values[row] = cell.value
      if (this.imaginary) this.imaginary.values[row] = 0
      if (cell.note) this.notes.set(cell.note, (this.notes.get(cell.note) ?? 0) + 1)
      if (cell.code) report(cell.code, text, { value: cell.value, more: "" })
      return
    }
    if (cell.kind === "complex" && this.imaginary) {
      this.numbers.values[row] = cell.re
      this.imaginary.values[row] = cell.im
      return
    }
    report(cell.kind === "bad" ? cell.code : "not-a-number", text)
    this.#missing(row)
  }

  #read(text: string): Cell {
    if (text !== this.#lastText) {
      this.#lastCell = readCell(text, this.style)
      this.#lastText = text
    }
    return this.#lastCell
  }

  #keepText(cell: Cell, text: string, row: number): void {
    if (this.plan.kind === "datetime" && cell.kind === "missing") this.#missing(row)
    else this.texts!.append(text)
  }

  #missing(row: number): void {
    if (this.texts) {
      this.texts.appendMissing()
      return
    }
    this.numbers.markMissing(row)
    this.imaginary?.markMissing(row)
  }
}
