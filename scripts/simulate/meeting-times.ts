import { randomStream } from "../../src/lib/stats/random/random-stream"

/**
 * Times at which two walkers on a ring meet that start opposite each other. Each hops at total rate G, half to each side, so
 * their distance walks at rate 2 G until it is a multiple of L: on average L^2 / (8 G) exactly, because a symmetric walk
 * leaves an interval of length L from its middle after (L/2)^2 steps on average (Feller, An Introduction to Probability
 * Theory, volume I, chapter XIV.3).
 *
 * @param sites even number of sites L
 * @returns one time a trajectory, in units in which rate is given
 */
export function simulateMeetingTimes(
  sites: number,
  rate: number,
  trajectories: number,
  seed: number,
): Float64Array {
  return Float64Array.from({ length: trajectories }, (_, trajectory) => {
    const stream = randomStream(seed, trajectory)
    let distance = sites / 2
    let now = 0
    while (distance > 0 && distance < sites) {
      // 1 - u is in (0, 1]: the logarithm is finite.
      now -= Math.log(1 - stream.uniform()) / (2 * rate)
      distance += stream.uint32() & 1 ? 1 : -1
    }
    return now
  })
}
