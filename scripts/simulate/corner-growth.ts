import { randomStream } from "../../src/lib/stats/random/random-stream"

export interface GrowthSettings {
  /** Columns of the ring, even. */
  readonly sites: number
  readonly trajectories: number
  /** Times at which the width is recorded, increasing, in units of the inverse rate of filling one corner. */
  readonly times: readonly number[]
  readonly seed: number
}

/**
 * Squared width of a growing interface: the corner growth (single-step) model on a ring, in continuous time. Neighbouring
 * heights differ by one; every local minimum is filled at rate 1, which raises it by two. The start is the flattest
 * interface, heights 0, 1, 0, 1, ...
 *
 * The model belongs to the universality class of Kardar, Parisi & Zhang, Phys. Rev. Lett. 56, 889 (1986): w^2 ~ t^(2/3)
 * while t is far below L^(3/2), then w^2 -> (L + 1)/12 exactly, because every closed path of steps +1 and -1 is equally
 * probable in the stationary state.
 *
 * @returns w^2 = spatial variance of the heights at each time, one row a trajectory
 */
export function simulateCornerGrowth({ sites, trajectories, times, seed }: GrowthSettings): Float64Array[] {
  return Array.from({ length: trajectories }, (_, trajectory) => {
    const stream = randomStream(seed, trajectory)
    const heights = Int32Array.from({ length: sites }, (__, x) => x % 2)
    const corners = new Int32Array(sites)
    const placeOf = new Int32Array(sites).fill(-1)
    let count = 0
    const update = (x: number) => {
      const left = heights[x === 0 ? sites - 1 : x - 1]!
      const right = heights[x === sites - 1 ? 0 : x + 1]!
      const isCorner = heights[x]! < left && heights[x]! < right
      const at = placeOf[x]!
      if (isCorner && at < 0) {
        placeOf[x] = count
        corners[count] = x
        count += 1
      } else if (!isCorner && at >= 0) {
        count -= 1
        const moved = corners[count]!
        corners[at] = moved
        placeOf[moved] = at
        placeOf[x] = -1
      }
    }
    for (let x = 0; x < sites; x += 1) update(x)
    const widths = new Float64Array(times.length)
    let now = 0
    let next = 0
    while (next < times.length) {
      // 1 - u is in (0, 1]: the logarithm is finite.
      now -= Math.log(1 - stream.uniform()) / count
      while (next < times.length && times[next]! < now) {
        widths[next] = squaredWidth(heights)
        next += 1
      }
      const x = corners[stream.below(count)]!
      heights[x] = heights[x]! + 2
      update(x)
      update(x === 0 ? sites - 1 : x - 1)
      update(x === sites - 1 ? 0 : x + 1)
    }
    return widths
  })
}

function squaredWidth(heights: Int32Array): number {
  const n = heights.length
  let sum = 0
  for (let x = 0; x < n; x += 1) sum += heights[x]!
  const mean = sum / n
  let squares = 0
  for (let x = 0; x < n; x += 1) squares += (heights[x]! - mean) ** 2
  return squares / n
}
