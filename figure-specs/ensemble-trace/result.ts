import type { DescribedColumns } from "../curve-panel/described-columns"
import type { CurveResult, PanelResult } from "../figure-kind"

export interface TraceCurve extends CurveResult {
  readonly trajectories: number
  readonly abscissa: readonly number[]
  readonly mean: readonly number[]
  readonly standardError: readonly (number | null)[]
  readonly bandLow: readonly (number | null)[] | null
  readonly bandHigh: readonly (number | null)[] | null
  readonly saturation: { readonly value: number; readonly window: readonly [number, number] } | null
}

export interface TraceResult extends PanelResult, DescribedColumns {
  readonly kind: "ensemble-trace"
  readonly curves: readonly TraceCurve[]
}
