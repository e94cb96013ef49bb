import type { AxisParams } from "../schema/panel-parts"

/** A measured point with the ends of its error bar, where it has one. */
export interface PlottedPoint {
  readonly x: number
  readonly y: number
  readonly low: number | null
  readonly high: number | null
}

/** A line through given places: a fit, a theory curve. */
export interface PlottedLine {
  readonly x: readonly number[]
  readonly y: readonly number[]
  /** True where the line is a continuation, which is drawn dashed; absent when none is. */
  readonly outside?: readonly boolean[]
  /** "own" is the curve's colour, "fit" black. */
  readonly color: "own" | "fit"
}

export interface PlottedBand {
  readonly x: readonly number[]
  readonly low: readonly number[]
  readonly high: readonly number[]
}

/** One series of a panel: its points, its lines and its bands in one colour. */
export interface PlottedCurve {
  /** Text of its legend entry; null for none. */
  readonly label: string | null
  readonly points: readonly PlottedPoint[]
  /** Whether points are joined: always, never, or when they are too crowded to carry a marker each. */
  readonly join: "always" | "never" | "crowded"
  /** False for a curve that is all line. */
  readonly markers: boolean
  readonly lines: readonly PlottedLine[]
  readonly bands: readonly PlottedBand[]
}

/** A straight line across the frame at one value of an axis, or a strip between two. */
export interface PlottedRule {
  readonly axis: "x" | "y"
  readonly from: number
  readonly to?: number
  readonly label: string | null
}

/** An axis of a panel: what it says unless the spec says otherwise. */
export interface AxisWish {
  readonly title: string
  readonly scale: "log" | "linear"
  readonly params: AxisParams
  /** Values that the axis must reach besides those of the points. */
  readonly include?: readonly number[]
}

/** A panel of curves, in data units. */
export interface CurvePanel {
  readonly curves: readonly PlottedCurve[]
  readonly legendTitle: string | null
  readonly x: AxisWish
  readonly y: AxisWish
  readonly rules: readonly PlottedRule[]
  readonly references?: {
    readonly slopes: readonly { readonly exponent: number; readonly label?: string | undefined }[]
    /** TeX of the abscissa. */
    readonly symbol: string
  }
  /** What a fitted line is called in the legend. */
  readonly fitLabel?: string
}
