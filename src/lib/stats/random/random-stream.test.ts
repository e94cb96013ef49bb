import { readFileSync } from "node:fs"
import { describe, expect, test } from "vitest"
import { randomStream, splitMix64, xoshiro128 } from "./random-stream"

// Published vectors and our stream rule: tests/reference/data/SOURCE.md.
const vectors = JSON.parse(
  readFileSync(new URL("../../../../tests/reference/data/prng/prng_vectors.json", import.meta.url), "utf8"),
)

describe("random streams", () => {
  test.each([
    ["seed0", 0n],
    ["seed1234567", 1234567n],
  ])("SplitMix64, %s", (name, seed) => {
    const source = splitMix64(seed)
    for (const expected of vectors.splitmix64[name]) expect(source.next().value).toBe(BigInt(expected))
  })

  test("xoshiro128** 1.1 from the state 1, 2, 3, 4", () => {
    const stream = xoshiro128([1, 2, 3, 4])
    for (const expected of vectors.xoshiro128starstar.state1234)
      expect(stream.uint32()).toBe(Number(expected))
  })

  test.each(Object.entries(vectors.streamRule.firstOutputs as Record<string, string[]>))(
    "stream %s of seed 42",
    (index, expected) => {
      const stream = randomStream(42, Number(index))
      for (const value of expected) expect(stream.uint32()).toBe(Number(value))
    },
  )

  test("below(n) stays in range and reaches both ends", () => {
    const stream = randomStream(7, 0)
    const seen = new Set(Array.from({ length: 200 }, () => stream.below(5)))
    expect([...seen].sort()).toEqual([0, 1, 2, 3, 4])
  })
})
