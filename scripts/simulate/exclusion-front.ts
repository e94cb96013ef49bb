import { randomStream } from "../../src/lib/stats/random/random-stream"

export interface FrontSettings {
  readonly trajectories: number
  /** Times at which the density is recorded, increasing, in units of the inverse hop rate. */
  readonly times: readonly number[]
  /** Left edges of the cells over which the density is averaged; all cells have `cell` sites. */
  readonly cells: readonly number[]
  readonly cell: number
  readonly seed: number
}

/**
 * A front spreading into vacuum: particles that hop to the right at rate 1 if the next site is free (the totally
 * asymmetric exclusion process), started from the step, all sites x <= 0 full and all others empty.
 *
 * The density follows rho = (1 - x/t)/2 between x = -t and x = t, so that the place where the density is c moves at
 * velocity 1 - 2c: Rost, Z. Wahrsch. verw. Geb. 58, 41 (1981).
 *
 * @returns density of each cell at each time, index `time * cells + cell`, one row a trajectory
 */
export function simulateExclusionFront(settings: FrontSettings): Float64Array[] {
  const { trajectories, times, cells, cell, seed } = settings
  return Array.from({ length: trajectories }, (_, trajectory) => {
    const stream = randomStream(seed, trajectory)
    // Position of particle i, counted from the foremost; a particle that never moved is at -i and need not be stored.
    const positions: number[] = [0]
    // Particles that can hop: the foremost always can, another if the site before it is free.
    const movable: number[] = [0]
    const placeOf: number[] = [0]
    const allow = (particle: number) => {
      if (placeOf[particle]! >= 0) return
      placeOf[particle] = movable.length
      movable.push(particle)
    }
    const forbid = (particle: number) => {
      const at = placeOf[particle]!
      const moved = movable.pop()!
      placeOf[particle] = -1
      if (moved === particle) return
      movable[at] = moved
      placeOf[moved] = at
    }
    const density = new Float64Array(times.length * cells.length)
    let now = 0
    let next = 0
    while (next < times.length) {
      // 1 - u is in (0, 1]: the logarithm is finite.
      now -= Math.log(1 - stream.uniform()) / movable.length
      while (next < times.length && times[next]! < now) {
        for (let c = 0; c < cells.length; c += 1)
          density[next * cells.length + c] = densityIn(positions, cells[c]!, cell)
        next += 1
      }
      const particle = movable[stream.below(movable.length)]!
      const position = positions[particle]! + 1
      positions[particle] = position
      if (particle > 0 && positions[particle - 1] === position + 1) forbid(particle)
      const behind = particle + 1
      if (behind === positions.length) {
        positions.push(-behind)
        placeOf.push(-1)
      }
      if (positions[behind]! < position - 1) allow(behind)
    }
    return density
  })
}

/** Share of occupied sites in [left, left + cell), from positions that decrease with the index. */
function densityIn(positions: readonly number[], left: number, cell: number): number {
  const before = (x: number) => {
    // Number of particles at positions >= x: those that moved, found by bisection, and all that never did.
    let low = 0
    let high = positions.length
    while (low < high) {
      const middle = (low + high) >> 1
      if (positions[middle]! >= x) low = middle + 1
      else high = middle
    }
    return low < positions.length ? low : Math.max(low, 1 - x)
  }
  return (before(left) - before(left + cell)) / cell
}
