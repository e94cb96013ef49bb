import type { z } from "zod"
import type { Quantity } from "@/lib/domain/quantity"
import type { StatisticalWarning } from "@/lib/stats/warnings/statistical-warning"
import type { Frame, PanelDrawing } from "./chart/drawing"

export type { Frame, LegendEntry, Look, PanelDrawing } from "./chart/drawing"

/** One column of a dataset version as a figure sees it. */
export interface TableColumn {
  readonly name: string
  readonly unit: string | null
  /** TeX without dollar signs, or null. */
  readonly symbol: string | null
  /** Numbers with NaN where missing, or text. Length = rows of the table. */
  readonly values: Float64Array | readonly string[]
}

/** One accepted dataset version, in memory. */
export interface DataTable {
  readonly columns: readonly TableColumn[]
  readonly rows: number
}

/** Everything a panel may read: the manuscript's tables by dataset name, already pinned to versions. */
export interface PanelInput {
  readonly tables: ReadonlyMap<string, DataTable>
}

/** Value of the curve-splitting parameter; null when a panel has one curve. */
export type CurveKey = number | string | null

/** Numbers as drawn, one table a series: what the bundle exports as CSV. */
export interface DrawnSeries {
  /** kebab-case, unique in the panel: "mean", "fit", "band". */
  readonly name: string
  readonly curve: CurveKey
  readonly columns: readonly {
    readonly name: string
    readonly unit: string | null
    readonly description: string
    /** null where there is no value. */
    readonly values: readonly (number | null)[]
  }[]
}

export interface CurveResult {
  readonly curve: CurveKey
  readonly quantities: readonly Quantity[]
}

/** What every kind computes. Kinds may add fields of their own; all must survive JSON unchanged. */
export interface PanelResult {
  readonly kind: string
  readonly curves: readonly CurveResult[]
  /** Quantities of the panel as a whole, and the named ones of the spec. */
  readonly quantities: readonly Quantity[]
  readonly warnings: readonly StatisticalWarning[]
  readonly series: readonly DrawnSeries[]
}

/** Kinds of control that a slot of the sentence opens in place. */
export type SlotControl =
  | { readonly type: "column"; readonly role: string; readonly optional: boolean }
  | { readonly type: "dataset" }
  | {
      readonly type: "choice"
      readonly options: readonly { readonly value: string; readonly label: string }[]
    }
  | {
      readonly type: "number"
      readonly min?: number
      readonly max?: number
      readonly step?: number
      readonly unit?: string
    }
  | { readonly type: "window"; readonly unit: string | null }
  | { readonly type: "filters" }
  | { readonly type: "references" }
  | { readonly type: "text" }

/** A run of the sentence: plain words, or a slot that edits the place in the panel that `pointer` names (RFC 6901). */
export type SentencePart =
  | { readonly type: "words"; readonly text: string }
  | {
      readonly type: "slot"
      readonly id: string
      readonly pointer: string
      /** What the slot says now; may hold TeX between dollar signs. */
      readonly text: string
      /** What it accepts, for screen readers and the margin: "fit window, two times in 1/J". */
      readonly accepts: string
      readonly control: SlotControl
      /** Where an emptied control writes, and whether it puts null there or takes the entry out; absent: it stays put. */
      readonly whenEmpty?: { readonly pointer: string; readonly put: "null" | "nothing" }
    }

export interface Sentence {
  readonly parts: readonly SentencePart[]
  /** The same sentence without controls, with its numbers when there is a result: the statistics part of the caption. */
  readonly plain: string
}

/**
 * `compute` in two steps: compute(input, params) is fit(prepare(input, params), params), and only `fit`, which takes a few
 * milliseconds, depends on the window that is dragged.
 */
export interface LiveComputation<Params, Result> {
  /** What of the parameters `prepare` depends on: while it is equal, what was prepared can be kept. */
  preparedFrom(params: Params): unknown
  prepare(input: PanelInput, params: Params, onProgress?: (done: number, total: number) => void): unknown
  fit(prepared: unknown, params: Params): Result
}

/**
 * What a panel shows. Each kind is a folder in figure-specs/ and one line in registry.ts.
 *
 * `compute` is pure and seeded and throws SpecError for input that it cannot use; `build` and `sentence` are pure too.
 */
export interface FigureKind<Params extends { kind: string }, Result extends PanelResult> {
  readonly kind: Params["kind"]
  readonly title: string
  readonly description: string
  readonly params: z.ZodType<Params>
  /** A valid panel to start from, given the columns at hand. */
  propose(dataset: string, table: DataTable, roles: ReadonlyMap<string, string>): Params
  compute(input: PanelInput, params: Params, onProgress?: (done: number, total: number) => void): Result
  build(result: Result, params: Params, frame: Frame): PanelDrawing
  sentence(params: Params, result?: Result): Sentence
  /** Present where a fit follows what is dragged. */
  readonly live?: LiveComputation<Params, Result>
}
