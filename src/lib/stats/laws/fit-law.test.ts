import { describe, expect, test } from "vitest"
import type { Ensemble } from "../ensemble/ensemble"
import { logMoments } from "../ensemble/log-moments"
import { normalQuantile } from "../distributions/normal-quantile"
import { randomStream } from "../random/random-stream"
import { meanRelaxationTime } from "./exponentials"
import { fitLaw, type LawFit } from "./fit-law"
import type { LawId } from "./law"
import { jackknifeTInterval, lawErrors, lawInterval } from "./law-errors"
import { laws } from "./laws"
import { deletionMeans, resampledMeans } from "./replicated-means"

const geometric = (first: number, last: number, count: number) =>
  Float64Array.from({ length: count }, (_, k) => first * (last / first) ** (k / (count - 1)))

/** Trajectories of mean `law(t)`, each with its own lognormal-free factor and independent noise of the given sizes. */
function ensembleOf(
  law: (t: number) => number,
  t: Float64Array,
  { trajectories = 40, spread = 0.1, noise = 0.05, seed = 1 } = {},
): Ensemble {
  const values = new Float64Array(trajectories * t.length)
  for (let i = 0; i < trajectories; i += 1) {
    const stream = randomStream(seed, i)
    const normal = () => normalQuantile((stream.uint32() + 0.5) / 4294967296)
    const factor = 1 + spread * normal()
    for (let k = 0; k < t.length; k += 1)
      values[i * t.length + k] = law(t[k]!) * factor * (1 + noise * normal())
  }
  return { abscissa: t, values, ids: Array.from({ length: trajectories }, (_, i) => String(i + 1)) }
}

const exactMeans = (law: (t: number) => number, t: Float64Array) =>
  deletionMeans(ensembleOf(law, t, { trajectories: 3, spread: 0, noise: 0 }))

const expectFit = (fit: ReturnType<typeof fitLaw>): LawFit => {
  if ("refused" in fit) throw new Error(`refused: ${fit.refused}`)
  return fit
}

describe("each law recovers its own parameters from its exact curve", () => {
  const t = geometric(0.5, 200, 30)
  const cases: [LawId, number[], Float64Array][] = [
    ["straight-line", [-3, 0.25], t],
    ["power-law", [2.5, -0.5], t],
    ["power-law-offset", [0.9, -0.8, 0.02], t],
    ["power-law-offset", [0.3, 2 / 3, 1.5], t],
    ["exponential", [1.7, 40], t],
    ["exponential-offset", [1.7, 40, -0.3], t],
    ["stretched-exponential", [1.2, 25, 0.6], t],
    ["finite-time-divergence", [2, 203, 0.5], t],
  ]
  for (const [id, parameters, times] of cases)
    for (const scale of ["raw", "log"] as const) {
      if (scale === "log" && !laws[id].log) continue
      test(`${id} ${parameters.join(", ")} on the ${scale} scale`, () => {
        const slopes = new Float64Array(parameters.length)
        const curve = (at: number) => laws[id].curve.value(at, Float64Array.from(parameters), slopes)
        const fit = expectFit(fitLaw(laws[id], exactMeans(curve, times), [null, null], { scale }))
        parameters.forEach((value, j) => expect(Math.abs(fit.parameters[j]! / value - 1)).toBeLessThan(1e-8))
        expect(fit.scale).toBe(scale)
        expect(fit.convergence.code).toBe("converged")
        expect(fit.convergence.confirmed).toBe(true)
      })
    }
})

test("derivatives of every curve agree with central differences", () => {
  const at: Partial<Record<LawId, number[]>> = {
    "straight-line": [2, -0.3],
    "power-law": [2, -0.6],
    "power-law-offset": [2, -0.6, 0.1],
    exponential: [2, 7],
    "exponential-offset": [2, 7, 0.1],
    "stretched-exponential": [2, 7, 0.6],
    "finite-time-divergence": [2, 30, 0.6],
  }
  for (const [id, values] of Object.entries(at) as [LawId, number[]][]) {
    const { curve } = laws[id]
    const slopes = new Float64Array(values.length)
    const scratch = new Float64Array(values.length)
    curve.value(3.7, Float64Array.from(values), slopes)
    values.forEach((value, j) => {
      const h = 1e-5 * Math.abs(value)
      const moved = (by: number) => Float64Array.from(values, (v, k) => (k === j ? v + by : v))
      const numeric = (curve.value(3.7, moved(h), scratch) - curve.value(3.7, moved(-h), scratch)) / (2 * h)
      expect(Math.abs(slopes[j]! - numeric), `${id} ${j}`).toBeLessThan(1e-8 * Math.max(1, Math.abs(numeric)))
    })
  }
})

describe("means of replicates", () => {
  const t = geometric(1, 100, 7)
  const ensemble = ensembleOf((at) => at ** -0.5, t, { trajectories: 6 })

  test("deletions agree with averaging what is left", () => {
    const means = deletionMeans(ensemble)
    for (let r = 0; r < 6; r += 1)
      for (let k = 0; k < 7; k += 1) {
        const left = [0, 1, 2, 3, 4, 5].filter((i) => i !== r).map((i) => ensemble.values[i * 7 + k]!)
        const mean = left.reduce((a, b) => a + b, 0) / 5
        const variance = left.reduce((a, b) => a + (b - mean) ** 2, 0) / 4 / 5
        expect(means.mean[(r + 1) * 7 + k]).toBeCloseTo(mean, 14)
        expect(means.variance[(r + 1) * 7 + k]! / variance).toBeCloseTo(1, 12)
      }
  })

  test("ratios to the first time, with weights, agree with the log moments", () => {
    const weighted = { ...ensemble, weights: Float64Array.of(1, 2, 0.5, 1, 3, 1) }
    const means = deletionMeans(weighted, 0)
    const logs = logMoments(weighted, 0)
    logs.lnMean.forEach((value, at) => expect(Math.log(means.mean[at]!)).toBeCloseTo(value, 13))
    logs.lnRelativeVariance.forEach((value, at) =>
      expect(Math.log(means.variance[at]! / means.mean[at]! ** 2)).toBeCloseTo(value, 10),
    )
  })

  test("a time that one trajectory lacks is left out", () => {
    const values = ensemble.values.slice()
    values[2 * 7 + 3] = Number.NaN
    expect(deletionMeans({ ...ensemble, values }).abscissa).toEqual(t.filter((_, k) => k !== 3))
  })
})

describe("errors from whole trajectories", () => {
  const t = geometric(1, 300, 25)
  const ensemble = ensembleOf((at) => 0.9 * at ** -0.8 + 0.05, t, { noise: 0.1 })
  const law = laws["power-law-offset"]
  const fit = expectFit(fitLaw(law, deletionMeans(ensemble), [null, null]))
  const errors = lawErrors(fit)

  test("jackknife and bootstrap agree on the size of the errors, and both hold the truth", () => {
    const resampled = expectFit(
      fitLaw(law, resampledMeans(ensemble, { resamples: 400, seed: 7 }), [null, null]),
    )
    expect(resampled.parameters).toEqual(fit.parameters)
    ;[0.9, -0.8, 0.05].forEach((truth, j) => {
      const { standardError } = errors.parameters[j]!
      const interval = lawInterval(resampled, j, 40, 0.95)!
      // Monte Carlo error of 400 resamples is 3.5 %; the jackknife's own scatter is about 11 % at 40 trajectories.
      expect(Math.abs(interval.standardError / standardError - 1)).toBeLessThan(0.3)
      expect(Math.abs(fit.parameters[j]! - truth)).toBeLessThan(3 * standardError)
      const [low, high] = jackknifeTInterval(fit.parameters[j]!, standardError, 40, 0.95)
      expect(low).toBeLessThan(fit.parameters[j]!)
      expect((high - low) / (interval.high - interval.low)).toBeGreaterThan(0.7)
      expect((high - low) / (interval.high - interval.low)).toBeLessThan(1.4)
    })
  })

  test("scaling time leaves the exponent and scales the amplitude as it must", () => {
    const scaled = { ...ensemble, abscissa: t.map((at) => 1000 * at) }
    const other = expectFit(fitLaw(law, deletionMeans(scaled), [null, null]))
    expect(other.parameters[1]).toBeCloseTo(fit.parameters[1]!, 10)
    expect(other.parameters[2]).toBeCloseTo(fit.parameters[2]!, 10)
    expect(other.parameters[0]! * 1000 ** fit.parameters[1]!).toBeCloseTo(fit.parameters[0]!, 9)
  })

  test("the order of the trajectories is irrelevant", () => {
    const order = [...ensemble.ids.keys()].reverse()
    const values = Float64Array.from(order.flatMap((i) => [...ensemble.values.subarray(i * 25, i * 25 + 25)]))
    const other = expectFit(fitLaw(law, deletionMeans({ ...ensemble, values }), [null, null]))
    fit.parameters.forEach((value, j) => expect(other.parameters[j]).toBeCloseTo(value, 11))
    errors.parameters.forEach(({ standardError }, j) =>
      expect(lawErrors(other).parameters[j]!.standardError / standardError).toBeCloseTo(1, 8),
    )
  })
})

describe("scale and refusals", () => {
  const t = geometric(1, 100, 12)

  test("logarithms where every mean is far from zero, values where one is not", () => {
    const clear = ensembleOf((at) => Math.exp(-at / 30), t)
    expect(expectFit(fitLaw(laws.exponential, deletionMeans(clear), [null, null])).scale).toBe("log")
    const noisy = ensembleOf((at) => Math.exp(-at / 30), t, { trajectories: 5, noise: 2 })
    expect(expectFit(fitLaw(laws.exponential, deletionMeans(noisy), [null, null])).scale).toBe("raw")
  })

  test("a negative mean has no logarithm", () => {
    const means = exactMeans((at) => 1 - at / 50, t)
    expect(fitLaw(laws.exponential, means, [null, null], { scale: "log" })).toMatchObject({
      refused: "NONPOSITIVE_MEANS",
    })
  })

  test("as many points as parameters are not a fit", () => {
    const means = exactMeans((at) => 1 / at, t)
    expect(fitLaw(laws["power-law-offset"], means, [1, t[2]!])).toEqual({
      refused: "TOO_FEW_POINTS",
      points: 3,
    })
    expect("refused" in fitLaw(laws["power-law-offset"], means, [1, t[3]!])).toBe(false)
  })

  test("growth has no relaxation time", () => {
    expect(
      fitLaw(
        laws.exponential,
        exactMeans((at) => 1 + at, t),
        [null, null],
        { scale: "log" },
      ),
    ).toMatchObject({
      refused: "BOUNDARY_SOLUTION",
    })
  })

  test("t = 0 is used by an exponential and left out of a power law", () => {
    const withZero = Float64Array.of(0, ...t)
    const fit = expectFit(
      fitLaw(
        laws.exponential,
        exactMeans((at) => Math.exp(-at / 9), withZero),
        [null, null],
      ),
    )
    expect([fit.from, fit.to]).toEqual([0, 13])
    const power = expectFit(
      fitLaw(
        laws["power-law"],
        exactMeans((at) => 1 / (at || 1), withZero),
        [null, null],
      ),
    )
    expect(power.from).toBe(1)
  })
})

test("mean relaxation time, the area under the curve: exact for beta = 1 and 1/2", () => {
  expect(meanRelaxationTime(3, 1)).toBeCloseTo(3, 14)
  // (tau / beta) Gamma(2) = 2 tau
  expect(meanRelaxationTime(3, 0.5)).toBeCloseTo(6, 13)
})
