import { describe, expect, test } from "vitest"
import type { Ensemble } from "../ensemble/ensemble"
import { normalQuantile } from "../distributions/normal-quantile"
import { laws } from "../laws/laws"
import { resampledMeans } from "../laws/replicated-means"
import { randomStream } from "../random/random-stream"
import { akaikeWeights } from "./aicc"
import { rankCharacteristicTimes } from "./rank-characteristic-times"
import { rankLaws } from "./rank-laws"

test("Akaike weights sum to one and fall by exp(-1) for a distance of 2", () => {
  const [first, second, third] = akaikeWeights([4, 6, Infinity])
  expect(first! + second!).toBeCloseTo(1, 15)
  expect(second! / first!).toBeCloseTo(Math.exp(-1), 15)
  expect(third).toBe(0)
})

describe("characteristic times", () => {
  const u = Float64Array.of(1, 1.5, 2, 3, 4, 6, 8)
  const ripple = Float64Array.of(1, -1, 1, -1, 1, -1, 1)
  const times = (law: (u: number) => number, scatter = 0.5) => {
    const tau = u.map((value, k) => law(value) * (1 + 0.03 * scatter * ripple[k]!))
    return { u, tau, sigma: tau.map((value) => 0.03 * value) }
  }

  test("each law is found where it holds", () => {
    for (const [name, law] of [
      ["power", (x: number) => 3 * x ** 1.7],
      ["exponential", (x: number) => 3 * Math.exp(0.6 * x)],
      ["activated", (x: number) => 3 * Math.exp(2 / x)],
    ] as const) {
      const ranking = rankCharacteristicTimes(times(law), "tau")
      expect(ranking.laws[0]!.law).toBe(name)
      expect(ranking.verdict).toBe("strongly favoured")
      expect(ranking.warnings).toEqual([])
    }
  })

  test("a law that fails its own chi-square is not favoured", () => {
    const wavy = times((x) => 3 * x ** 1.7, 5)
    expect(rankCharacteristicTimes({ ...wavy, sigma: wavy.sigma.map((s) => s / 3) }, "tau").verdict).toBe(
      "no law fits",
    )
  })

  test("laws within the errors of each other are undecided", () => {
    const blurred = times((x) => 3 * x ** 0.1)
    expect(
      rankCharacteristicTimes({ ...blurred, sigma: blurred.tau.map((v) => 0.3 * v) }, "tau").verdict,
    ).toBe("undecided")
  })

  test("MODEL_RANK_UNSAFE: five points, or a factor below three", () => {
    const all = times((x) => 3 * x ** 1.7)
    const few = {
      u: all.u.slice(0, 5),
      tau: all.tau.slice(0, 5),
      sigma: all.sigma.slice(0, 5),
    }
    expect(rankCharacteristicTimes(few, "tau").warnings.map(({ code }) => code)).toEqual([
      "MODEL_RANK_UNSAFE",
    ])
    const narrow = rankCharacteristicTimes({ ...all, u: all.u.map((x) => x + 10) }, "tau")
    expect(narrow.verdict).toBe("unsafe")
  })
})

describe("laws along one ensemble", () => {
  const t = Float64Array.from({ length: 24 }, (_, k) => 100 ** (k / 23))
  const ensemble = (law: (t: number) => number): Ensemble => {
    const values = new Float64Array(30 * t.length)
    for (let i = 0; i < 30; i += 1) {
      const stream = randomStream(5, i)
      const normal = () => normalQuantile((stream.uint32() + 0.5) / 4294967296)
      const factor = 1 + 0.05 * normal()
      for (let k = 0; k < t.length; k += 1)
        values[i * t.length + k] = law(t[k]!) * factor * (1 + 0.05 * normal())
    }
    return { abscissa: t, values, ids: Array.from({ length: 30 }, (_, i) => String(i)) }
  }
  const candidates = [laws["power-law"], laws.exponential, laws["stretched-exponential"]]

  test("a clear stretched exponential wins nearly always, and shares sum to one", () => {
    const means = resampledMeans(
      ensemble((at) => Math.exp(-((at / 10) ** 0.5))),
      { resamples: 100, seed: 1 },
    )
    const ranking = rankLaws(candidates, means, [null, null], "raw", "curve")
    expect(ranking.laws[0]!.law.id).toBe("stretched-exponential")
    expect(ranking.laws[0]!.wins).toBeGreaterThan(0.9)
    expect(ranking.laws.reduce((sum, { wins }) => sum + wins, 0)).toBeCloseTo(1, 12)
    expect(ranking.warnings).toEqual([])
  })

  test("MODEL_RANK_UNSAFE on too few points for the longest law", () => {
    const means = resampledMeans(
      ensemble((at) => 1 / at),
      { resamples: 20, seed: 1 },
    )
    const ranking = rankLaws(candidates, means, [null, t[4]!], "raw", "curve")
    expect(ranking.warnings.map(({ code }) => code)).toEqual(["MODEL_RANK_UNSAFE"])
  })
})
