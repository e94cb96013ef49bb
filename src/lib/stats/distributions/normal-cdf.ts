import cdf from "@stdlib/stats-base-dists-normal-cdf"

/** Probability below x under the standard normal distribution. NaN outside the domain. */
export function normalCdf(x: number): number {
  return cdf(x, 0, 1)
}
