import quantile from "@stdlib/stats-base-dists-t-quantile"

/** Quantile of Student's t distribution with `dof` degrees of freedom: the x below which lies the given probability. NaN outside the domain. */
export function tQuantile(probability: number, dof: number): number {
  return quantile(probability, dof)
}
