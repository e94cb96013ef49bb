const mask64 = (1n << 64n) - 1n

/** SplitMix64: successive 64-bit outputs from a 64-bit state. @see Steele, Lea & Flood, OOPSLA 2014 */
export function* splitMix64(seed: bigint): Generator<bigint, never> {
  let state = seed & mask64
  for (;;) {
    state = (state + 0x9e3779b97f4a7c15n) & mask64
    let z = state
    z = ((z ^ (z >> 30n)) * 0xbf58476d1ce4e5b9n) & mask64
    z = ((z ^ (z >> 27n)) * 0x94d049bb133111ebn) & mask64
    yield z ^ (z >> 31n)
  }
}

/** A stream of random numbers; the same seed and index give the same numbers everywhere. */
export interface RandomStream {
  /** Next integer, uniform on 0 .. 2^32 - 1. */
  uint32(): number
  /** Uniform on [0, 1) with 32 random bits. */
  uniform(): number
  /** Uniform integer on 0 .. n - 1, n <= 2^32, by floor(u n / 2^32); the bias is below n / 2^32. */
  below(n: number): number
}

/** xoshiro128** 1.1 from a state of four 32-bit words, not all zero. @see Blackman & Vigna, ACM TOMS 47, 36 (2021) */
export function xoshiro128(state: readonly [number, number, number, number]): RandomStream {
  let [a, b, c, d] = state
  const uint32 = () => {
    const times5 = Math.imul(b, 5)
    const result = Math.imul((times5 << 7) | (times5 >>> 25), 9) >>> 0
    const shifted = b << 9
    c ^= a
    d ^= b
    b ^= c
    a ^= d
    c ^= shifted
    d = (d << 11) | (d >>> 21)
    return result
  }
  return {
    uint32,
    uniform: () => uint32() / 4294967296,
    below: (n) => Math.floor((uint32() * n) / 4294967296),
  }
}

/**
 * The stream of one resample: one stream per resample index, not per thread, so that results do not depend on how the
 * work is shared out, and resample b of 2 000 is resample b of 10 000.
 *
 * @param seed of the analysis, a non-negative integer
 * @param index of the resample, from 0
 */
export function randomStream(seed: number, index: number): RandomStream {
  const start = BigInt(seed) ^ ((BigInt(index + 1) * 0xd1342543de82ef95n) & mask64)
  const source = splitMix64(start)
  const first = source.next().value
  const second = source.next().value
  const low = (x: bigint) => Number(x & 0xffffffffn)
  return xoshiro128([low(first), low(first >> 32n), low(second), low(second >> 32n)])
}
