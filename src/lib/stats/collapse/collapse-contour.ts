import { nelderMead } from "../nonlinear/nelder-mead"
import { guardedQuality, type CollapseFit } from "./fit-collapse"
import type { SizeCurve } from "./size-curve"

/**
 * Range of one exponent over which S, minimised over the other, stays below its minimum plus 1. A convention of the field
 * and not a confidence interval: S is already divided by the number of points.
 *
 * @returns an end is infinite where the curves stop overlapping first
 * @see docs/methods.md, scaling collapse
 */
export function collapseContour(
  curves: readonly SizeCurve[],
  fit: CollapseFit,
  exponent: "a" | "z",
): readonly [number, number] {
  const limit = fit.quality + 1
  const profile = (value: number): number => {
    if (fit.constraint.kind !== "free") return alongConstraint(curves, fit, exponent, value)
    const other = exponent === "a" ? fit.z : fit.a
    const rate = ([q]: Float64Array) =>
      guardedQuality(curves, exponent === "a" ? { a: value, z: q! } : { a: q!, z: value }, fit.pointsAtGuess)
    return nelderMead(rate, [other], [0.05 * Math.max(Math.abs(other), 0.5)], 1e-5, 200).value
  }
  return [end(profile, fit[exponent], -1, limit), end(profile, fit[exponent], 1, limit)]
}

function alongConstraint(
  curves: readonly SizeCurve[],
  { constraint, pointsAtGuess, a, z }: CollapseFit,
  exponent: "a" | "z",
  value: number,
): number {
  const moved = exponent === "a" ? { a: value, z } : { a, z: value }
  if (constraint.kind === "sum")
    return guardedQuality(
      curves,
      exponent === "a" ? { a: value, z: constraint.sum - value } : { a: constraint.sum - value, z: value },
      pointsAtGuess,
    )
  const fixed =
    (constraint.kind === "fixed-a" && exponent === "a") || (constraint.kind === "fixed-z" && exponent === "z")
  return fixed ? Infinity : guardedQuality(curves, moved, pointsAtGuess)
}

/** Where the profile first exceeds the limit: steps that double, then halving to 1e-5. */
function end(profile: (value: number) => number, best: number, direction: 1 | -1, limit: number): number {
  let inside = best
  let step = 1e-3
  while (profile(inside + direction * step) <= limit) {
    inside += direction * step
    step *= 2
    if (step > 100) return direction * Infinity
  }
  if (profile(inside + direction * step) === Infinity && step <= 1e-3) return best
  let outside = inside + direction * step
  while (Math.abs(outside - inside) > 1e-5) {
    const middle = (inside + outside) / 2
    if (profile(middle) <= limit) inside = middle
    else outside = middle
  }
  // The guard, not S, ended the range.
  return profile(outside) === Infinity ? direction * Infinity : inside
}
