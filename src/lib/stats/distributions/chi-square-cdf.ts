import cdf from "@stdlib/stats-base-dists-chisquare-cdf"

/** Probability below x under the chi-square distribution with `dof` degrees of freedom. NaN outside the domain. */
export function chiSquareCdf(x: number, dof: number): number {
  return cdf(x, dof)
}
