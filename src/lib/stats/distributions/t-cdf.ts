import cdf from "@stdlib/stats-base-dists-t-cdf"

/** Probability below x under Student's t distribution with `dof` degrees of freedom. NaN outside the domain. */
export function tCdf(x: number, dof: number): number {
  return cdf(x, dof)
}
