import { randomStream } from "../../src/lib/stats/random/random-stream"
import { normalNumber } from "./normal-numbers"

export interface MomentaSettings {
  readonly particles: number
  readonly trajectories: number
  /** Times at which momenta are counted, increasing from 0, in units of the inverse friction rate. */
  readonly times: readonly number[]
  /** Variance of the momentum before the quench and in the bath. */
  readonly cold: number
  readonly hot: number
  /** Edges of the momentum bins, increasing and equally spaced. */
  readonly edges: readonly number[]
  readonly seed: number
}

/**
 * Momenta of independent particles that are put into a hotter bath: each follows an Ornstein-Uhlenbeck process with
 * friction rate 1, sampled exactly, so that the distribution stays normal with variance hot + (cold - hot) exp(-2 t):
 * Uhlenbeck & Ornstein, Phys. Rev. 36, 823 (1930).
 *
 * @returns number of particles in each bin at each time, index `time * bins + bin`, one row a trajectory
 */
export function simulateMomenta(settings: MomentaSettings): Float64Array[] {
  const { particles, trajectories, times, cold, hot, edges, seed } = settings
  const bins = edges.length - 1
  const width = (edges[bins]! - edges[0]!) / bins
  return Array.from({ length: trajectories }, (_, trajectory) => {
    const stream = randomStream(seed, trajectory)
    const counts = new Float64Array(times.length * bins)
    for (let i = 0; i < particles; i += 1) {
      let momentum = Math.sqrt(cold) * normalNumber(stream)
      times.forEach((t, k) => {
        const kept = Math.exp(-(t - (times[k - 1] ?? t)))
        momentum = kept * momentum + Math.sqrt(hot * (1 - kept * kept)) * normalNumber(stream)
        const bin = Math.floor((momentum - edges[0]!) / width)
        if (bin >= 0 && bin < bins) counts[k * bins + bin] = counts[k * bins + bin]! + 1
      })
    }
    return counts
  })
}
