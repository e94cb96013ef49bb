import { readFileSync } from "node:fs"
import { describe, expect, test } from "vitest"
import {
  curveProblem,
  inLogParameters,
  naturalParameters,
  type Curve,
} from "@/lib/stats/nonlinear/curve-problem"
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
