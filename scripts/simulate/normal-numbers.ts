import type { RandomStream } from "../../src/lib/stats/random/random-stream"

/** A normal random number of mean 0 and variance 1. @see Box & Muller, Ann. Math. Stat. 29, 610 (1958) */
export const normalNumber = (stream: RandomStream): number =>
  Math.sqrt(-2 * Math.log(1 - stream.uniform())) * Math.cos(2 * Math.PI * stream.uniform())
