import cdf from "@stdlib/stats-base-dists-f-cdf"

/** Probability below x under the F distribution with `dof1` and `dof2` degrees of freedom. NaN outside the domain. */
export function fCdf(x: number, dof1: number, dof2: number): number {
  return cdf(x, dof1, dof2)
}
