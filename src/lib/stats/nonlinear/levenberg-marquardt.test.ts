import { describe, expect, test } from "vitest"
import { curveProblem, type Curve } from "./curve-problem"
import { levenbergMarquardt } from "./levenberg-marquardt"
import { multiStart } from "./multi-start"
import { normalCovariance } from "./normal-covariance"
import { separableProblem, type SeparableModel } from "./separable-problem"

const decay: Curve = {
  parameters: 2,
  value(x, [amplitude, rate], slopes) {
    slopes[0] = Math.exp(-rate! * x)
    slopes[1] = -amplitude! * x * slopes[0]
    return amplitude! * slopes[0]
  },
}
const separableDecay: SeparableModel = {
  shapes: 1,
  coefficients: 1,
  evaluate(t, [rate], out) {
    out.terms[0] = Math.exp(-rate! * t)
    out.termSlopes[0] = -t * out.terms[0]
  },
}
const x = Float64Array.from({ length: 21 }, (_, k) => k / 4)
const ones = new Float64Array(21).fill(1)
const exact = x.map((t) => 3 * Math.exp(-0.7 * t))
/** A fixed ripple in place of noise. */
const rippled = exact.map((y, k) => y + 0.05 * Math.sin(12.9898 * (k + 1)))

describe("Levenberg–Marquardt", () => {
  test("recovers the parameters of exact data and knows that nothing is left", () => {
    const fit = levenbergMarquardt(curveProblem(decay, x, exact, ones), [1, 5])
    expect(fit.code).toBe("converged")
    expect(fit.parameters[0]).toBeCloseTo(3, 12)
    expect(fit.parameters[1]).toBeCloseTo(0.7, 12)
    expect(fit.sumOfSquares).toBeLessThan(1e-28)
  })

  test("residuals are orthogonal to the Jacobian at the minimum", () => {
    const fit = levenbergMarquardt(curveProblem(decay, x, rippled, ones), [1, 5])
    expect(fit.code).toBe("converged")
    expect(fit.gradientCosine).toBeLessThan(1e-12)
  })

  test("stops at a bound that the minimum lies beyond, and says so", () => {
    const bounds = { low: Float64Array.of(0, 1), high: Float64Array.of(100, 5) }
    const fit = levenbergMarquardt(curveProblem(decay, x, rippled, ones, bounds), [1, 3])
    expect(fit.code).toBe("converged")
    expect(fit.parameters[1]).toBe(1)
    expect(fit.atBound).toEqual([1])
    const free = levenbergMarquardt(curveProblem(decay, x, rippled, ones), [1, 3])
    expect(free.parameters[1]).toBeLessThan(1)
    expect(free.atBound).toEqual([])
  })

  test("admits that it ran out of iterations or had no value to start from", () => {
    expect(levenbergMarquardt(curveProblem(decay, x, rippled, ones), [1, 5], 2).code).toBe("iteration-limit")
    expect(levenbergMarquardt(curveProblem(decay, x, rippled, ones), [1, Number.NaN]).code).toBe(
      "undefined-start",
    )
  })

  test("admits a stall where the derivatives do not belong to the curve", () => {
    const wrong: Curve = {
      parameters: 1,
      value(t, [rate], slopes) {
        slopes[0] = t
        return Math.exp(-rate! * t)
      },
    }
    expect(levenbergMarquardt(curveProblem(wrong, x, rippled, ones), [2]).code).not.toBe("converged")
  })
})

describe("variable projection", () => {
  const bounds = { low: Float64Array.of(0.01), high: Float64Array.of(10) }

  test("finds the minimum of the full problem", () => {
    const full = levenbergMarquardt(curveProblem(decay, x, rippled, ones), [1, 1])
    const problem = separableProblem(separableDecay, x, rippled, ones, bounds)
    const reduced = multiStart(problem, [Float64Array.of(0.1), Float64Array.of(1), Float64Array.of(5)])
    expect(reduced.confirmed).toBe(true)
    expect(reduced.parameters[0]).toBeCloseTo(full.parameters[1]!, 11)
    expect(problem.coefficients()[0]).toBeCloseTo(full.parameters[0]!, 11)
    expect(reduced.sumOfSquares).toBeCloseTo(full.sumOfSquares, 14)
  })

  test("has no value where its terms are dependent", () => {
    const twice: SeparableModel = {
      shapes: 1,
      coefficients: 2,
      evaluate(t, [rate], out) {
        out.terms[0] = Math.exp(-rate! * t)
        out.terms[1] = 2 * out.terms[0]
        out.termSlopes.fill(0)
      },
    }
    expect(
      separableProblem(twice, x, rippled, ones).residuals(Float64Array.of(1), new Float64Array(21)),
    ).toBe(false)
  })
})

test("a sum of squares with two equal minima is found from several starts, the best of them confirmed", () => {
  // (s^2 - 1)^2 has its minima at -1 and 1.
  const well: Curve = {
    parameters: 1,
    value(_, [s], slopes) {
      slopes[0] = 2 * s!
      return s! * s!
    },
  }
  const one = Float64Array.of(1)
  const bounds = { low: Float64Array.of(-3), high: Float64Array.of(3) }
  const fit = multiStart(curveProblem(well, one, one, one, bounds), [Float64Array.of(0.5)])
  expect(Math.abs(fit.parameters[0]!)).toBeCloseTo(1, 10)
  expect(fit.confirmed).toBe(true)
})

test("a minimum that only one start reaches is not confirmed", () => {
  // A narrow dip at s = 2.5 inside a flat bowl around 0.
  const dip: Curve = {
    parameters: 1,
    value(_, [s], slopes) {
      const d = (s! - 2.5) / 0.01
      const e = Math.exp(-d * d)
      slopes[0] = 0.2 * s! + (40 * d * e) / 0.01
      return 2 + 0.1 * s! * s! - 20 * e
    },
  }
  const bounds = { low: Float64Array.of(-3), high: Float64Array.of(3) }
  const problem = curveProblem(dip, Float64Array.of(1), Float64Array.of(0), Float64Array.of(1), bounds)
  const fit = multiStart(problem, [], [Float64Array.of(2.495)])
  expect(fit.sumOfSquares).toBeLessThan(1)
  expect(fit.confirmed).toBe(false)
})

test("dependent columns have no covariance", () => {
  expect(normalCovariance(Float64Array.of(1, 2, 2, 4, 3, 6), 3, 2).every(Number.isNaN)).toBe(true)
  // Of a straight line through -1, 0, 1: var(level) = 1/3, var(slope) = 1/2.
  const covariance = normalCovariance(Float64Array.of(1, -1, 1, 0, 1, 1), 3, 2)
  expect(covariance[0]).toBeCloseTo(1 / 3, 14)
  expect(covariance[3]).toBeCloseTo(1 / 2, 14)
  expect(covariance[1]).toBeCloseTo(0, 14)
})
