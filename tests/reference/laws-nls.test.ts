import { readFileSync } from "node:fs"
import { describe, expect, test } from "vitest"
import {
  curveProblem,
  inLogParameters,
  naturalParameters,
  type Curve,
} from "@/lib/stats/nonlinear/curve-problem"
import { fitLawGivenErrors } from "@/lib/stats/laws/fit-law-given-errors"
import type { LawId } from "@/lib/stats/laws/law"
import { laws } from "@/lib/stats/laws/laws"
import { levenbergMarquardt } from "@/lib/stats/nonlinear/levenberg-marquardt"
import { normalCovariance } from "@/lib/stats/nonlinear/normal-covariance"

// R's nls on the same data; relative 1e-6 for coefficients, 1e-5 for errors, 1e-8 for the sum of squares, as the file states.
const r = JSON.parse(readFileSync(new URL("./data/r/nls.json", import.meta.url), "utf8"))

interface Case {
  readonly curve: Curve
  readonly positive: readonly boolean[]
  /** A start wrong by factors of two to five. */
  readonly start: readonly number[]
  readonly names: readonly string[]
  readonly weight: (y: number) => number
}

const cases: Record<string, Case> = {
  kohlrausch: {
    curve: {
      parameters: 3,
      value(t, [amplitude, tau, beta], slopes) {
        const s = (t / tau!) ** beta!
        slopes[0] = Math.exp(-s)
        slopes[1] = (amplitude! * slopes[0] * s * beta!) / tau!
        slopes[2] = -amplitude! * slopes[0] * s * Math.log(t / tau!)
        return amplitude! * slopes[0]
      },
    },
    positive: [true, true, true],
    start: [3, 0.5, 1.5],
    names: ["A", "tau", "b"],
    weight: () => 1,
  },
  powerOffset: {
    curve: {
      parameters: 3,
      value(t, [amplitude, a, offset], slopes) {
        slopes[0] = t ** -a!
        slopes[1] = -amplitude! * slopes[0] * Math.log(t)
        slopes[2] = 1
        return amplitude! * slopes[0] + offset!
      },
    },
    positive: [true, true, false],
    start: [0.3, 0.2, 0],
    names: ["A", "a", "c0"],
    weight: () => 1,
  },
  divergence: {
    curve: {
      parameters: 3,
      value(t, [amplitude, singular, g], slopes) {
        const left = singular! - t
        slopes[0] = left ** -g!
        slopes[1] = (-g! * amplitude! * slopes[0]) / left
        slopes[2] = -amplitude! * slopes[0] * Math.log(left)
        return amplitude! * slopes[0]
      },
    },
    positive: [true, false, true],
    start: [1, 12, 1],
    names: ["A", "ts", "gm"],
    weight: (y) => 1 / y,
  },
}

describe("all parameters at once, against R", () =>
  Object.entries(cases).forEach(([name, { curve, positive, start, names, weight }]) =>
    test(name, () => {
      const reference = r[name]
      const y = Float64Array.from(reference.y as number[])
      const n = y.length
      const x = Float64Array.from(reference.t as number[])
      const logged = start.map((value, j) => (positive[j] ? Math.log(value) : value))
      const problem = curveProblem(inLogParameters(curve, positive), x, y, y.map(weight))
      const fit = levenbergMarquardt(problem, logged)
      expect(fit.code).toBe("converged")
      const natural = naturalParameters(fit.parameters, positive)
      const jacobian = new Float64Array(n * 3)
      curveProblem(curve, x, y, y.map(weight)).jacobian(natural, jacobian)
      const scale = fit.sumOfSquares / reference.df
      const covariance = normalCovariance(jacobian, n, 3)
      names.forEach((parameter, j) => {
        expect(Math.abs(natural[j]! / reference.coef[parameter] - 1)).toBeLessThan(1e-6)
        const error = Math.sqrt(scale * covariance[j * 3 + j]!)
        expect(Math.abs(error / reference.se[parameter] - 1)).toBeLessThan(1e-5)
      })
      expect(Math.abs(fit.sumOfSquares / reference.rss - 1)).toBeLessThan(1e-8)
    }),
  ))

describe("the laws themselves, amplitudes eliminated, against R", () => {
  // Sign of R's coefficient in our parametrisation; the power law is written t^b here and t^-a there.
  const rows: [string, LawId, readonly [string, number][], (y: number) => number][] = [
    [
      "kohlrausch",
      "stretched-exponential",
      [
        ["A", 1],
        ["tau", 1],
        ["b", 1],
      ],
      () => 1,
    ],
    [
      "powerOffset",
      "power-law-offset",
      [
        ["A", 1],
        ["a", -1],
        ["c0", 1],
      ],
      () => 1,
    ],
    [
      "divergence",
      "finite-time-divergence",
      [
        ["A", 1],
        ["ts", 1],
        ["gm", 1],
      ],
      (y) => y,
    ],
  ]
  for (const [name, id, names, sigmaOf] of rows)
    test(name, () => {
      const reference = r[name]
      const y = Float64Array.from(reference.y as number[])
      const points = { t: Float64Array.from(reference.t as number[]), y, sigma: y.map(sigmaOf) }
      const result = fitLawGivenErrors(laws[id], points, [null, null], {
        scale: "raw",
        resamples: 0,
        seed: 1,
      })
      if ("refused" in result) throw new Error(result.refused)
      const { fit, standardErrors } = result
      expect(fit.convergence).toMatchObject({ code: "converged", confirmed: true, atBound: false })
      expect(Math.abs(fit.chiSquare / reference.rss - 1)).toBeLessThan(1e-8)
      // nls estimates the scale of the errors from the residuals.
      const scale = Math.sqrt(fit.chiSquare / fit.degreesOfFreedom)
      names.forEach(([parameter, sign], j) => {
        expect(Math.abs((sign * fit.parameters[j]!) / reference.coef[parameter] - 1)).toBeLessThan(1e-6)
        expect(Math.abs((standardErrors[j]! * scale) / reference.se[parameter] - 1)).toBeLessThan(1e-5)
      })
    })

  test("a divergence fitted in the logarithm stays within an error of the one fitted to the values", () => {
    const reference = r.divergence
    const y = Float64Array.from(reference.y as number[])
    const points = { t: Float64Array.from(reference.t as number[]), y, sigma: y }
    const result = fitLawGivenErrors(laws["finite-time-divergence"], points, [null, null], {
      scale: "log",
      resamples: 0,
      seed: 1,
    })
    if ("refused" in result) throw new Error(result.refused)
    ;["A", "ts", "gm"].forEach((parameter, j) =>
      expect(Math.abs(result.fit.parameters[j]! - reference.coef[parameter])).toBeLessThan(
        0.25 * reference.se[parameter],
      ),
    )
  })
})
