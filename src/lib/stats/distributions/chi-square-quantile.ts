import quantile from "@stdlib/stats-base-dists-chisquare-quantile"

/** Quantile of the chi-square distribution with `dof` degrees of freedom: the x below which lies the given probability. NaN outside the domain. */
export function chiSquareQuantile(probability: number, dof: number): number {
  return quantile(probability, dof)
}
