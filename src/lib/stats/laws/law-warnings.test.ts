import { describe, expect, test } from "vitest"
import { normalQuantile } from "../distributions/normal-quantile"
import { randomStream } from "../random/random-stream"
import { fitLaw, type LawFit } from "./fit-law"
import {
  fitLawGivenErrors,
  givenErrorsWarnings,
  parametricInterval,
  type GivenPoints,
} from "./fit-law-given-errors"
import type { LawId } from "./law"
import { lawBound, lawErrors } from "./law-errors"
import { lawErrorWarnings, lawJackknifeWarnings, lawRefusalWarning, lawSearchWarnings } from "./law-warnings"
import { laws } from "./laws"
import { deletionMeans } from "./replicated-means"

const geometric = (first: number, last: number, count: number) =>
  Float64Array.from({ length: count }, (_, k) => first * (last / first) ** (k / (count - 1)))

function study(
  id: LawId,
  truth: (t: number) => number,
  t: Float64Array,
  { trajectories = 40, noise = 0.02, outlier = 1, scale = "auto" as const, seed = 3 } = {},
) {
  const values = new Float64Array(trajectories * t.length)
  for (let i = 0; i < trajectories; i += 1) {
    const stream = randomStream(seed, i)
    for (let k = 0; k < t.length; k += 1) {
      const z = normalQuantile((stream.uint32() + 0.5) / 4294967296)
      values[i * t.length + k] = truth(t[k]!) * (1 + noise * (i === 0 ? outlier : 1) * z)
    }
  }
  const ids = Array.from({ length: trajectories }, (_, i) => `run ${i + 1}`)
  const means = deletionMeans({ abscissa: t, values, ids })
  const fit = fitLaw(laws[id], means, [null, null], { scale })
  if ("refused" in fit) throw new Error(fit.refused)
  const errors = lawErrors(fit)
  const codes = [
    ...lawSearchWarnings(fit, means, "curve"),
    ...lawErrorWarnings(fit, errors.covariance, "curve"),
    ...lawJackknifeWarnings(fit, errors.parameters, means, ids, "curve"),
  ]
  return {
    fit,
    means,
    errors,
    codes: codes.map(({ code }) => code),
    messages: codes.map(({ message }) => message),
  }
}

describe("BOUNDARY_SOLUTION", () => {
  const t = geometric(1, 30, 20)
  test("a relaxation time longer than two windows is only a bound", () => {
    expect(study("exponential", (at) => Math.exp(-at / 100), t).codes).toContain("BOUNDARY_SOLUTION")
  })
  test("one inside the window is a value", () => {
    expect(study("exponential", (at) => Math.exp(-at / 15), t).codes).toEqual([])
  })
  test("an exponential growth has no time of divergence", () => {
    const linear = Float64Array.from({ length: 30 }, (_, k) => k)
    const { codes, fit } = study("finite-time-divergence", (at) => Math.exp(at / 10), linear, {
      noise: 0.002,
    })
    expect(codes).toContain("BOUNDARY_SOLUTION")
    expect(fit.convergence.atBound).toBe(true)
    // Only that it lies beyond the window by more than its length.
    expect(lawBound(fit, 1, 0.95, "lower")).toBeGreaterThan(58)
  })
})

describe("DEGENERATE", () => {
  const t = geometric(1, 1000, 30)
  test("an offset within two errors of zero", () => {
    const { codes, messages } = study("power-law-offset", (at) => at ** -0.5, t)
    expect(codes).toContain("DEGENERATE")
    expect(messages.join()).toContain("The offset and zero")
  })
  test("exponent and offset over a short range", () => {
    const short = study("power-law-offset", (at) => at ** -0.5 + 0.5, geometric(1, 4, 20))
    expect(short.messages.join()).toContain("The exponent and the offset cannot be told apart")
  })
  test("a clear offset over three decades", () => {
    expect(study("power-law-offset", (at) => at ** -0.5 + 0.5, t).codes).toEqual([])
  })
  test("a stretching exponent that may be 1, and one that is not", () => {
    const window = geometric(0.1, 40, 30)
    expect(study("stretched-exponential", (at) => Math.exp(-at / 10), window).messages.join()).toContain(
      "The stretching exponent and 1",
    )
    expect(study("stretched-exponential", (at) => Math.exp(-((at / 10) ** 0.5)), window).codes).toEqual([])
  })
})

describe("SHORT_RANGE", () => {
  const linear = Float64Array.from({ length: 40 }, (_, k) => k)
  test("a divergence seen from afar spans less than a decade of the distance to it", () => {
    const { codes } = study("finite-time-divergence", (at) => (60 - at) ** -0.5, linear, { noise: 0.0005 })
    expect(codes).toContain("SHORT_RANGE")
  })
  test("one approached to a two-hundredth of the way does not", () => {
    const { codes, fit } = study("finite-time-divergence", (at) => (39.2 - at) ** -0.5, linear, {
      noise: 0.002,
    })
    expect(codes).not.toContain("SHORT_RANGE")
    expect(codes).not.toContain("BOUNDARY_SOLUTION")
    expect(fit.parameters[1]).toBeCloseTo(39.2, 2)
  })
})

describe("LOG_BIAS and HEAVY_TAILS", () => {
  const t = geometric(1, 30, 20)
  test("means of 40 % relative error", () => {
    expect(
      study("exponential", (at) => Math.exp(-at / 15), t, {
        trajectories: 4,
        noise: 0.5,
        scale: "log" as never,
        seed: 5,
      }).codes,
    ).toContain("LOG_BIAS")
  })
  test("one trajectory that is far noisier than the rest", () => {
    const { codes, messages } = study("exponential", (at) => Math.exp(-at / 15), t, { outlier: 20 })
    expect(codes).toContain("HEAVY_TAILS")
    expect(messages.join()).toContain("run 1")
  })
})

describe("the search", () => {
  const base = study("exponential", (at) => Math.exp(-at / 15), geometric(1, 30, 20))
  const searched = (change: Partial<LawFit["convergence"]>, replicatesAtBound = 0) =>
    lawSearchWarnings(
      { ...base.fit, replicatesAtBound, convergence: { ...base.fit.convergence, ...change } },
      base.means,
      "curve",
    ).map(({ code }) => code)
  test("MULTIPLE_MINIMA when no second start agrees", () => {
    expect(searched({ confirmed: false })).toEqual(["MULTIPLE_MINIMA"])
    expect(searched({})).toEqual([])
  })
  test("BOUNDARY_SOLUTION when resamples run to the end of the range", () => {
    expect(searched({}, 1)).toEqual(["BOUNDARY_SOLUTION"])
  })
  test("BOOTSTRAP_FAILURES above one per cent, severe above five", () => {
    const failing = (count: number) => {
      const replicates = new Float64Array(200).map((_, k) => (k < 2 * count ? Number.NaN : 1))
      return lawSearchWarnings({ ...base.fit, replicates }, base.means, "curve").map(
        ({ code, severity }) => `${code} ${severity}`,
      )
    }
    expect(failing(1)).toEqual([])
    expect(failing(3)).toEqual(["BOOTSTRAP_FAILURES caution"])
    expect(failing(6)).toEqual(["BOOTSTRAP_FAILURES severe"])
  })
  test("every refusal has its sentence", () => {
    expect(lawRefusalWarning({ refused: "TOO_FEW_POINTS", points: 3 }, "curve").message).toContain(
      "Only 3 points",
    )
    expect(lawRefusalWarning({ refused: "NONPOSITIVE_MEANS", points: 2 }, "curve").message).toContain(
      "at 2 times",
    )
    expect(lawRefusalWarning({ refused: "NO_CONVERGENCE", points: 9 }, "curve").code).toBe("NO_CONVERGENCE")
    expect(lawRefusalWarning({ refused: "BOUNDARY_SOLUTION", points: 9 }, "curve").code).toBe(
      "BOUNDARY_SOLUTION",
    )
  })
})

describe("points with given errors", () => {
  const t = geometric(1, 300, 25)
  const stream = randomStream(11, 0)
  const z = t.map(() => normalQuantile((stream.uint32() + 0.5) / 4294967296))
  const exact = t.map((at) => 0.9 * at ** -0.8 + 0.05)
  const points = (actual: number, stated: number): GivenPoints => ({
    t,
    y: exact.map((y, k) => y * (1 + actual * z[k]!)),
    sigma: exact.map((y) => y * stated),
  })
  const codesOf = (given: GivenPoints, birge = false) => {
    const result = fitLawGivenErrors(laws["power-law-offset"], given, [null, null], {
      resamples: 300,
      seed: 1,
      birge,
    })
    if ("refused" in result) throw new Error(result.refused)
    return { result, codes: givenErrorsWarnings(result, given, "curve").map(({ code }) => code) }
  }

  test("honest errors: no warning, and the parametric bootstrap agrees with the analytic errors", () => {
    const { result, codes } = codesOf(points(0.02, 0.02))
    expect(codes).toEqual([])
    expect(result.birgeFactor).toBe(1)
    // Monte Carlo error of 300 resamples: 4 %.
    result.standardErrors.forEach((error, j) =>
      expect(Math.abs(result.resampledErrors[j]! / error - 1)).toBeLessThan(0.15),
    )
    const [low, high] = parametricInterval(result, 1, 0.6827)!
    expect((high - low) / 2 / result.standardErrors[1]!).toBeGreaterThan(0.85)
    expect((high - low) / 2 / result.standardErrors[1]!).toBeLessThan(1.15)
  })
  test("CHI2_TOO_SMALL when the points scatter far less than stated", () => {
    expect(codesOf(points(0.005, 0.02)).codes).toEqual(["CHI2_TOO_SMALL"])
  })
  test("SCATTER_EXCEEDS_ERRORS when they scatter more, unless the errors are widened on purpose", () => {
    expect(codesOf(points(0.06, 0.02)).codes).toContain("SCATTER_EXCEEDS_ERRORS")
    const { result, codes } = codesOf(points(0.06, 0.02), true)
    expect(codes).not.toContain("SCATTER_EXCEEDS_ERRORS")
    expect(result.birgeFactor).toBeCloseTo(Math.sqrt(result.fit.chiSquare / 22), 12)
  })
})
