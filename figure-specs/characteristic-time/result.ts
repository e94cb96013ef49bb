import type { Verdict } from "@/lib/stats/ranking/rank-characteristic-times"
import type { DrawnLine, DrawnMean } from "../curve-panel/curve-series"
import type { DescribedColumns } from "../curve-panel/described-columns"
import type { CurveResult, PanelResult } from "../figure-kind"
import type { TimeLawName } from "./params"

export interface RankedLawResult extends DrawnLine {
  readonly law: TimeLawName
  readonly aicc: number
  /** Distance from the best criterion, and the Akaike weight. */
  readonly delta: number
  readonly weight: number
  /** Of a larger chi-square; null when the errors are unknown. */
  readonly probability: number | null
}

export interface TimeCurve extends CurveResult, DrawnMean {
  readonly curve: CurveResult["curve"]
  /** Trajectories behind each time. */
  readonly counts: readonly number[]
  /** The law that is shown first, then the others by rank. */
  readonly laws: readonly RankedLawResult[]
  readonly verdict: Verdict | null
}

export interface CharacteristicTimeResult extends PanelResult, DescribedColumns {
  readonly kind: "characteristic-time"
  readonly curves: readonly TimeCurve[]
}
