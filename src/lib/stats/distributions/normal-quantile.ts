import quantile from "@stdlib/stats-base-dists-normal-quantile"

/** Quantile of the standard normal distribution: the x below which lies the given probability. NaN outside the domain. */
export function normalQuantile(probability: number): number {
  return quantile(probability, 0, 1)
}
