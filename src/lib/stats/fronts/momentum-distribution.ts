import type { StatisticalWarning } from "../warnings/statistical-warning"
import { warn } from "../warnings/warning-catalogue"

/**
 * Wavevectors 2 pi j/L of a ring of L sites in increasing order, centred on zero; for even L the edge of the zone is
 * counted once, at -pi.
 *
 * @example momentumGrid(4) // [-pi, -pi/2, 0, pi/2]
 */
export function momentumGrid(sites: number): Float64Array {
  return Float64Array.from({ length: sites }, (_, j) => (2 * Math.PI * (j - Math.floor(sites / 2))) / sites)
}

/** `modes`: n_k counts particles, sum_k n_k = N. `density`: integral n(k) dk/(2 pi) = N/L. They differ by L. */
export type MomentumConvention = "modes" | "density"

/**
 * Total of a distribution over one zone in the convention it is declared in.
 *
 * @param k wavevectors, increasing, covering -pi to pi once; @param n the distribution
 */
export function momentumTotal(k: Float64Array, n: Float64Array, convention: MomentumConvention): number {
  const count = k.length
  let total = 0
  for (let j = 0; j < count; j += 1) {
    if (convention === "modes") total += n[j]!
    else {
      const before = j > 0 ? k[j - 1]! : k[count - 1]! - 2 * Math.PI
      const after = j + 1 < count ? k[j + 1]! : k[0]! + 2 * Math.PI
      total += (n[j]! * (after - before)) / (4 * Math.PI)
    }
  }
  return total
}

const tolerance = 1e-3

/**
 * Holds a distribution against the particles it should contain.
 *
 * @param expected N for modes, N/L for a density
 */
export function normalisationWarnings(total: number, expected: number, where: string): StatisticalWarning[] {
  if (Math.abs(total - expected) <= tolerance * Math.abs(expected)) return []
  const say = (value: number) => String(Number(value.toPrecision(4)))
  return [warn("NORMALISATION", where, { sum: say(total), expected: say(expected) })]
}
