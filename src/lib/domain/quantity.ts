/** A confidence interval and the method it comes from; docs/methods.md explains each type. */
export interface Interval {
  readonly level: number
  readonly low: number
  readonly high: number
  readonly type:
    | "jackknife-t"
    | "expanded-percentile"
    | "bca"
    | "studentized"
    | "percentile"
    | "basic"
    | "analytic"
    | "parametric-bootstrap"
}

/** How a number was made: enough to write it in a methods section and to make it again. */
export interface Provenance {
  readonly estimator: string
  readonly weights?: string
  /** Ends of the fit window, in the unit of the abscissa. */
  readonly window?: readonly [number, number]
  /** log10 of the window's upper over its lower end. */
  readonly decades?: number
  readonly trajectories?: number
  readonly points?: number
  readonly degreesOfFreedom?: number
  readonly resamples?: number
  readonly seed?: number
  /** One sentence in the words of a methods section. */
  readonly sentence: string
}

/** A number with an uncertainty that a figure produces. `value` is unrounded; `text` and `tex` are made from it. */
export interface Quantity {
  readonly name: string
  readonly value: number
  readonly standardError: number | null
  readonly interval: Interval | null
  readonly text: string
  readonly tex: string
  readonly unit?: string | null
  readonly theory?: TheoryComparison
  readonly provenance?: Provenance
}

/** A quantity against a value from theory, in standard errors. */
export interface TheoryComparison {
  readonly value: number
  readonly label?: string
  readonly standardErrors: number
  readonly words: string
}
