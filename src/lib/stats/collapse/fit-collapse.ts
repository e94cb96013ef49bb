import { nelderMead } from "../nonlinear/nelder-mead"
import { collapseQuality } from "./collapse-quality"
import type { CollapseExponents, SizeCurve } from "./size-curve"

/** What is searched: both exponents, one of them, or both along a relation a + z = sum. */
export type CollapseConstraint =
  | { readonly kind: "free" }
  | { readonly kind: "fixed-a"; readonly a: number }
  | { readonly kind: "fixed-z"; readonly z: number }
  | { readonly kind: "sum"; readonly sum: number }

export interface CollapseFit extends CollapseExponents {
  /** S at the optimum; without errors it ranks, but states nothing. */
  readonly quality: number
  /** Points compared at the optimum, and at the guess. */
  readonly points: number
  readonly pointsAtGuess: number
  readonly constraint: CollapseConstraint
  readonly converged: boolean
  /** Whether a second start ended at the same exponents. */
  readonly confirmed: boolean
}

/** A collapse improves trivially when the curves stop overlapping, so this share of the compared points has to stay. */
const keptShare = 0.8
const tolerance = 1e-6
/** Two ends of the search closer than this are the same minimum: S is only piecewise smooth. */
const sameMinimum = 1e-3

/** Coordinates of the search and the way back. */
function coordinates(constraint: CollapseConstraint, { a, z }: CollapseExponents) {
  switch (constraint.kind) {
    case "free":
      return {
        start: [a, z],
        exponents: ([p, q]: ArrayLike<number> & Iterable<number>) => ({ a: p!, z: q! }),
      }
    case "fixed-a":
      return { start: [z], exponents: ([q]: Iterable<number>) => ({ a: constraint.a, z: q! }) }
    case "fixed-z":
      return { start: [a], exponents: ([p]: Iterable<number>) => ({ a: p!, z: constraint.z }) }
    case "sum":
      return { start: [a], exponents: ([p]: Iterable<number>) => ({ a: p!, z: constraint.sum - p! }) }
  }
}

/**
 * S where enough points are still compared, Infinity elsewhere.
 *
 * @param pointsAtGuess of the start of the search
 */
export function guardedQuality(
  curves: readonly SizeCurve[],
  exponents: CollapseExponents,
  pointsAtGuess: number,
): number {
  const { quality, points } = collapseQuality(curves, exponents)
  return points >= keptShare * pointsAtGuess ? quality : Infinity
}

/**
 * Exponents of the best collapse y = L^a F(t/L^z): Nelder–Mead on S from the guess and nine points around it.
 *
 * @param curves of at least two sizes; @param guess exponents at which the curves overlap
 * @returns null when the curves do not overlap at the guess
 * @see docs/methods.md, scaling collapse
 */
export function fitCollapse(
  curves: readonly SizeCurve[],
  guess: CollapseExponents,
  constraint: CollapseConstraint = { kind: "free" },
): CollapseFit | null {
  const { start, exponents } = coordinates(constraint, guess)
  const pointsAtGuess = collapseQuality(curves, exponents(start)).points
  if (pointsAtGuess === 0) return null
  const rate = (point: Float64Array) => guardedQuality(curves, exponents(point), pointsAtGuess)
  const reach = start.map((value) => 0.2 * Math.max(Math.abs(value), 0.5))
  const ends = startsAround(start, reach)
    .filter((point) => rate(point) < Infinity)
    .map((point) =>
      nelderMead(
        rate,
        point,
        reach.map((r) => r / 2),
        tolerance,
      ),
    )
    .sort((p, q) => p.value - q.value)
  // S has small kinks: once more from the best end with a fresh simplex.
  const again = nelderMead(
    rate,
    ends[0]!.point,
    reach.map((r) => r / 10),
    tolerance,
  )
  const best = again.value <= ends[0]!.value ? again : ends[0]!
  const near = ends.filter(({ point }) => point.every((v, j) => Math.abs(v - best.point[j]!) <= sameMinimum))
  return {
    ...exponents(best.point),
    quality: best.value,
    points: collapseQuality(curves, exponents(best.point)).points,
    pointsAtGuess,
    constraint,
    converged: best.converged,
    confirmed: near.length >= 2,
  }
}

/** The guess and nine points around it: a 3 x 3 grid without its middle and one farther out, or ten along one axis. */
function startsAround(start: readonly number[], reach: readonly number[]): Float64Array[] {
  if (start.length === 1)
    return Array.from({ length: 10 }, (_, k) =>
      Float64Array.of(start[0]! + (reach[0]! * (k % 2 ? -1 : 1) * Math.ceil(k / 2)) / 3),
    )
  const offsets = [
    [0, 0],
    ...[-1, 0, 1].flatMap((p) => [-1, 0, 1].map((q) => [p, q])).filter(([p, q]) => p !== 0 || q !== 0),
    [2, 2],
  ]
  return offsets.map((offset) => Float64Array.from(start, (value, j) => value + offset[j]! * reach[j]!))
}

/**
 * The fit again on other data of the same shape, from the optimum of the first: for resamples.
 *
 * @returns NaN exponents when the curves cannot be compared there
 */
export function refitCollapse(curves: readonly SizeCurve[], fit: CollapseFit): CollapseExponents {
  const { start, exponents } = coordinates(fit.constraint, fit)
  const rate = (point: Float64Array) => guardedQuality(curves, exponents(point), fit.pointsAtGuess)
  const step = start.map((value) => 0.02 * Math.max(Math.abs(value), 0.5))
  if (rate(Float64Array.from(start)) === Infinity) return { a: Number.NaN, z: Number.NaN }
  const end = nelderMead(rate, start, step, tolerance)
  return end.converged ? exponents(end.point) : { a: Number.NaN, z: Number.NaN }
}
