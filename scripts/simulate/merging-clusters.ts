import { randomStream } from "../../src/lib/stats/random/random-stream"

export interface MergingSettings {
  readonly particles: number
  readonly trajectories: number
  /** Times at which the mean size is recorded, increasing, below 1. */
  readonly times: readonly number[]
  readonly seed: number
}

/**
 * Clusters that merge at a rate proportional to the product of their sizes: every pair of N particles is joined at rate
 * 1/N. The size of the cluster of a random particle, sum s^2 / N, is 1/(1 - t) for large N and diverges at t* = 1 with
 * exponent 1: Erdős & Rényi, Publ. Math. Inst. Hung. Acad. Sci. 5, 17 (1960); McLeod, Q. J. Math. 13, 119 (1962). For finite N
 * it holds while 1 - t is far above N^(-1/3).
 *
 * @returns sum s^2 / N at each time, one row a trajectory
 */
export function simulateMerging({ particles, trajectories, times, seed }: MergingSettings): Float64Array[] {
  const pairRate = (particles - 1) / 2
  return Array.from({ length: trajectories }, (_, trajectory) => {
    const stream = randomStream(seed, trajectory)
    const parent = Int32Array.from({ length: particles }, (__, i) => i)
    const size = new Float64Array(particles).fill(1)
    const rootOf = (i: number): number => {
      let root = i
      while (parent[root] !== root) {
        parent[root] = parent[parent[root]!]!
        root = parent[root]!
      }
      return root
    }
    const means = new Float64Array(times.length)
    let squares = particles
    let now = 0
    let next = 0
    while (next < times.length) {
      // 1 - u is in (0, 1]: the logarithm is finite.
      now -= Math.log(1 - stream.uniform()) / pairRate
      while (next < times.length && times[next]! < now) {
        means[next] = squares / particles
        next += 1
      }
      const one = stream.below(particles)
      const other = stream.below(particles - 1)
      const a = rootOf(one)
      const b = rootOf(other < one ? other : other + 1)
      if (a === b) continue
      const [small, large] = size[a]! < size[b]! ? [a, b] : [b, a]
      squares += 2 * size[small]! * size[large]!
      parent[small] = large
      size[large] = size[large]! + size[small]!
    }
    return means
  })
}
