import type { DescribedColumns } from "../curve-panel/described-columns"
import type { CurveKey, CurveResult, PanelResult } from "../figure-kind"

/** Columns as plain arrays, so that a result survives JSON. */
export interface DecayCurve extends CurveResult {
  readonly curve: CurveKey
  readonly trajectories: number
  /** The reduced ensemble: times, mean, standard error (null for a single trajectory). */
  readonly abscissa: readonly number[]
  readonly mean: readonly number[]
  readonly standardError: readonly (number | null)[]
  readonly fit: DecayFitResult | null
}

/** The fitted law and its band on a grid, inside the window and up to half a decade beyond it where there are data. */
export interface DecayFitResult {
  readonly exponent: number
  readonly amplitude: number
  readonly window: readonly [number, number]
  readonly grid: readonly number[]
  readonly line: readonly number[]
  readonly bandLow: readonly number[] | null
  readonly bandHigh: readonly number[] | null
  /** True where the grid point lies outside the window. */
  readonly outside: readonly boolean[]
}

export interface DecayResult extends PanelResult, DescribedColumns {
  readonly kind: "decay-exponent"
  readonly curves: readonly DecayCurve[]
}
