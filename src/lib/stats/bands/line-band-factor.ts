import { fQuantile } from "../distributions/f-quantile"
import { tQuantile } from "../distributions/t-quantile"

/**
 * Factor on the standard error of a fitted straight line for a band of the given level, with `dof` degrees of freedom
 * (trajectories - 1): t for a pointwise band, sqrt(2 F) for one that holds the whole line.
 *
 * @see Working & Hotelling, J. Am. Stat. Assoc. 24, 73 (1929); Scheffe, The Analysis of Variance (1959)
 */
export function lineBandFactor(kind: "pointwise" | "simultaneous", level: number, dof: number): number {
  return kind === "pointwise" ? tQuantile((1 + level) / 2, dof) : Math.sqrt(2 * fQuantile(level, 2, dof))
}
