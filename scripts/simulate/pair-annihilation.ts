import { randomStream } from "../../src/lib/stats/random/random-stream"

export interface AnnihilationSettings {
  /** Sites of the ring; also the number of walkers at t = 0, one on every site. */
  readonly sites: number
  readonly trajectories: number
  /** Total hop rate of a walker, half to each side: D = rate / 2. */
  readonly rate: number
  /** Times at which the density is recorded, increasing, in units of the inverse rate. */
  readonly times: readonly number[]
  readonly seed: number
}

/**
 * A + A -> 0 in one dimension in continuous time: every walker hops at total rate G, half to each side, and two walkers
 * that meet vanish. All walkers share one exponential clock of rate G N, so every step picks one walker and one side.
 *
 * From the full lattice the density is exactly exp(-2 G t) I0(2 G t), which decays as (4 pi G t)^(-1/2): Glauber, J. Math.
 * Phys. 4, 294 (1963) by duality; Torney & McConnell, J. Phys. Chem. 87, 1941 (1983). The ring does not matter while
 * (G t)^(1/2), the distance over which walkers know of each other, is far below the number of sites.
 *
 * @returns walkers per site at each time, one row a trajectory
 */
export function simulateAnnihilation({
  sites,
  trajectories,
  rate,
  times,
  seed,
}: AnnihilationSettings): Float64Array[] {
  return Array.from({ length: trajectories }, (_, trajectory) => {
    const stream = randomStream(seed, trajectory)
    const occupant = new Int32Array(sites).fill(-1)
    const walkers = Int32Array.from({ length: sites }, (__, site) => site)
    for (let i = 0; i < sites; i += 1) occupant[i] = i
    let alive = sites
    let now = 0
    const remove = (walker: number) => {
      alive -= 1
      const last = walkers[alive]!
      occupant[walkers[walker]!] = -1
      if (walker !== alive) {
        walkers[walker] = last
        occupant[last] = walker
      }
    }
    const density = new Float64Array(times.length)
    let next = 0
    while (next < times.length) {
      // 1 - u is in (0, 1]: the logarithm is finite.
      now = alive === 0 ? Infinity : now - Math.log(1 - stream.uniform()) / (rate * alive)
      while (next < times.length && times[next]! < now) {
        density[next] = alive / sites
        next += 1
      }
      if (next === times.length) break
      const walker = stream.below(alive)
      const from = walkers[walker]!
      const to = stream.uint32() & 1 ? (from + 1) % sites : (from + sites - 1) % sites
      const met = occupant[to]!
      if (met < 0) {
        occupant[from] = -1
        occupant[to] = walker
        walkers[walker] = to
      } else {
        remove(walker)
        // The last walker may have taken the place of the removed one.
        remove(occupant[to]!)
      }
    }
    return density
  })
}
