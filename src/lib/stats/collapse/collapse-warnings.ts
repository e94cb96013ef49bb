import type { StatisticalWarning } from "../warnings/statistical-warning"
import { warn } from "../warnings/warning-catalogue"
import { refitCollapse, type CollapseFit } from "./fit-collapse"
import type { SizeCurve } from "./size-curve"

/** S beyond which the curves do not fall onto one another, and below which their errors are doubtful. */
const poor = 4
const tooGood = 0.1
/** Share of the compared points down to which the guard, not S, may have set the exponents. */
const nearGuard = 0.82

/**
 * What a referee would ask about a collapse.
 *
 * @param errors standard errors of the exponents, from resamples
 * @param hasErrors whether the points carry errors
 */
export function collapseWarnings(
  curves: readonly SizeCurve[],
  fit: CollapseFit,
  errors: { readonly a: number; readonly z: number },
  hasErrors: boolean,
  where: string,
): StatisticalWarning[] {
  const warnings: StatisticalWarning[] = []
  if (!fit.converged) return [warn("NO_CONVERGENCE", where)]
  if (!fit.confirmed) warnings.push(warn("MULTIPLE_MINIMA", where))
  if (fit.points < nearGuard * fit.pointsAtGuess)
    warnings.push(warn("BOUNDARY_SOLUTION", where, { parameter: "The overlap of the curves" }))
  if (hasErrors && fit.quality > poor)
    warnings.push(warn("COLLAPSE_POOR", where, { quality: fit.quality.toFixed(1) }))
  if (hasErrors && fit.quality < tooGood) warnings.push(warn("CHI2_TOO_SMALL", where))
  if (curves.length >= 3) {
    const smallest = Math.min(...curves.map(({ lnSize }) => lnSize))
    const larger = curves.filter(({ lnSize }) => lnSize > smallest)
    const { a, z } = refitCollapse(larger, { ...fit, pointsAtGuess: 1 })
    if (Math.abs(a - fit.a) > 2 * errors.a || Math.abs(z - fit.z) > 2 * errors.z)
      warnings.push(warn("FINITE_SIZE_SUSPECT", where))
  }
  return warnings
}

/** Times beyond a tenth of the saturation time of the smallest system are suspect in a growth fit. */
const earlyShare = 0.1

/** @param lastTime of the fit window; @param size L; @param z dynamical exponent; lattice units */
export function saturationWarnings(
  lastTime: number,
  size: number,
  z: number,
  where: string,
): StatisticalWarning[] {
  return lastTime / size ** z > earlyShare ? [warn("FINITE_SIZE_SUSPECT", where)] : []
}
