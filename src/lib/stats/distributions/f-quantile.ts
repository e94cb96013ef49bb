import quantile from "@stdlib/stats-base-dists-f-quantile"

/** Quantile of the F distribution with `dof1` and `dof2` degrees of freedom: the x below which lies the given probability. NaN outside the domain. */
export function fQuantile(probability: number, dof1: number, dof2: number): number {
  return quantile(probability, dof1, dof2)
}
