import type { LeastSquaresProblem } from "./least-squares-problem"

/** A model curve with analytic derivatives. */
export interface Curve {
  /** Number of parameters p. */
  readonly parameters: number
  /** Value at x; writes the p derivatives by the parameters. */
  value(x: number, parameters: Float64Array, slopes: Float64Array): number
}

/**
 * Weighted least squares of a curve in all its parameters; residuals are sqrt(w) (model - y).
 *
 * @param rootWeights square roots of the weights, length n
 */
export function curveProblem(
  curve: Curve,
  x: Float64Array,
  y: Float64Array,
  rootWeights: Float64Array,
  bounds?: LeastSquaresProblem["bounds"],
): LeastSquaresProblem {
  const p = curve.parameters
  const slopes = new Float64Array(p)
  let squaresOfData = 0
  for (let i = 0; i < x.length; i += 1) squaresOfData += (rootWeights[i]! * y[i]!) ** 2
  return {
    points: x.length,
    parameters: p,
    ...(bounds && { bounds }),
    exactBelow: 1e-28 * squaresOfData,
    residuals(parameters, out) {
      for (let i = 0; i < x.length; i += 1)
        out[i] = rootWeights[i]! * (curve.value(x[i]!, parameters, slopes) - y[i]!)
      return out.every(Number.isFinite)
    },
    jacobian(parameters, out) {
      for (let i = 0; i < x.length; i += 1) {
        curve.value(x[i]!, parameters, slopes)
        for (let j = 0; j < p; j += 1) out[i * p + j] = rootWeights[i]! * slopes[j]!
      }
    },
  }
}

/**
 * The same curve in the logarithms of its positive parameters, so that a step cannot leave their range and a start may be
 * wrong by a factor.
 *
 * @param positive whether each parameter is positive
 */
export function inLogParameters(curve: Curve, positive: readonly boolean[]): Curve {
  return {
    parameters: curve.parameters,
    value(x, logged, slopes) {
      const natural = naturalParameters(logged, positive)
      const value = curve.value(x, natural, slopes)
      for (let j = 0; j < slopes.length; j += 1) if (positive[j]) slopes[j] = slopes[j]! * natural[j]!
      return value
    },
  }
}

/** Undoes the logarithm of the positive parameters. */
export function naturalParameters(logged: Float64Array, positive: readonly boolean[]): Float64Array {
  return logged.map((value, j) => (positive[j] ? Math.exp(value) : value))
}
