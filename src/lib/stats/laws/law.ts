import type { Curve } from "../nonlinear/curve-problem"
import type { SeparableModel } from "../nonlinear/separable-problem"

export type LawId =
  | "straight-line"
  | "power-law"
  | "power-law-offset"
  | "exponential"
  | "exponential-offset"
  | "stretched-exponential"
  | "finite-time-divergence"

/** What is fitted: the values themselves, or their logarithms. */
export type LawScale = "raw" | "log"

/** A law made ready for the times of one window. */
export interface ScaledLaw {
  /** Nonlinear in internal shapes (logarithms where positive), linear in the rest. */
  readonly model: SeparableModel
  /** Range of each shape; reaching its end is reported, not quoted. */
  readonly low: Float64Array
  readonly high: Float64Array
  /** Shapes to rate before the search. */
  readonly grid: readonly Float64Array[]
  /** The law's own parameters from shapes and coefficients; not finite where the law is not reached. */
  assemble(shapes: Float64Array, coefficients: Float64Array): Float64Array
}

/** A curve that theory proposes for an ensemble mean. */
export interface Law {
  readonly id: LawId
  /** In TeX, for captions and tables. */
  readonly tex: string
  /** Names of the parameters, in the order of every array of them. */
  readonly parameters: readonly string[]
  /** Whether the law has values at t > 0 only. */
  readonly positiveTimes: boolean
  /** Value and derivatives by the law's own parameters. */
  readonly curve: Curve
  /** Ready to fit the values at these increasing times. */
  raw(t: Float64Array): ScaledLaw
  /** Ready to fit their logarithms; absent where the law may change sign. */
  log?(t: Float64Array): ScaledLaw
  /** Pairs of parameters that a short window may not tell apart. */
  readonly rivals: readonly (readonly [string, string])[]
  /** Parameter values at which the law becomes a simpler one. */
  readonly simplerAt: readonly {
    readonly parameter: string
    readonly value: number
    readonly words: string
  }[]
}

/** Shapes on a product grid, each axis given. */
export function productGrid(...axes: readonly ArrayLike<number>[]): Float64Array[] {
  return axes
    .reduce<number[][]>(
      (points, axis) => points.flatMap((point) => Array.from(axis, (value) => [...point, value])),
      [[]],
    )
    .map((point) => Float64Array.from(point))
}

/** `count` values equally spaced from low to high, ends included. */
export function spaced(low: number, high: number, count: number): Float64Array {
  return Float64Array.from({ length: count }, (_, k) => low + ((high - low) * k) / (count - 1))
}
