import type { DrawnLine, DrawnMean } from "../curve-panel/curve-series"
import type { DescribedColumns } from "../curve-panel/described-columns"
import type { CurveResult, PanelResult } from "../figure-kind"

export interface DivergenceCurve extends CurveResult, DrawnMean {
  readonly curve: CurveResult["curve"]
  readonly fit:
    (DrawnLine & { readonly singularTime: number; readonly window: readonly [number, number] }) | null
}

export interface DivergenceResult extends PanelResult, DescribedColumns {
  readonly kind: "finite-time-divergence"
  readonly curves: readonly DivergenceCurve[]
}
