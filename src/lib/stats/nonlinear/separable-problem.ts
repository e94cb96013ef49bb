import {
  applyQ,
  applyQTranspose,
  diagonalRatio,
  factorQr,
  solveTriangle,
  type QrFactors,
} from "./householder-qr"
import type { LeastSquaresProblem } from "./least-squares-problem"

/** Values at one abscissa, to be overwritten; q shape parameters, l terms. */
export interface TermValues {
  /** Part of the model without a linear coefficient. */
  fixed: number
  /** Its derivatives by the shapes, length q. */
  readonly fixedSlopes: Float64Array
  /** What each linear coefficient multiplies, length l. */
  readonly terms: Float64Array
  /** Derivatives of the terms by the shapes, l x q row-major. */
  readonly termSlopes: Float64Array
}

/** fixed(t; s) + sum_l c_l term_l(t; s): nonlinear in the shapes s, linear in the coefficients c. */
export interface SeparableModel {
  readonly shapes: number
  readonly coefficients: number
  evaluate(t: number, shapes: Float64Array, out: TermValues): void
}

export interface SeparableProblem extends LeastSquaresProblem {
  /** Best linear coefficients at the shapes of the last call of `residuals`. */
  coefficients(): Float64Array
}

/** Below this the terms do not determine their coefficients at these shapes. */
const rankTolerance = 1e-10

/**
 * Weighted least squares with the linear coefficients eliminated (variable projection): for each choice of shapes the
 * coefficients are the linear optimum, so only the shapes are searched. Residuals are sqrt(w) (model - y); the Jacobian is
 * Kaufman's, whose gradient is exact.
 *
 * @param t abscissas; @param y ordinates; @param rootWeights square roots of the weights; all of length n
 * @see Golub & Pereyra, SIAM J. Numer. Anal. 10, 413 (1973); Kaufman, BIT 15, 49 (1975)
 */
export function separableProblem(
  model: SeparableModel,
  t: Float64Array,
  y: Float64Array,
  rootWeights: Float64Array,
  bounds?: LeastSquaresProblem["bounds"],
): SeparableProblem {
  const n = t.length
  const { shapes: q, coefficients: l } = model
  const at: TermValues = {
    fixed: 0,
    fixedSlopes: new Float64Array(q),
    terms: new Float64Array(l),
    termSlopes: new Float64Array(l * q),
  }
  const storage = new Float64Array(n * l)
  const norms = new Float64Array(l)
  const diagonal = new Float64Array(l)
  const column = new Float64Array(n)
  let squaresOfData = 0
  for (let i = 0; i < n; i += 1) squaresOfData += (rootWeights[i]! * y[i]!) ** 2
  let qr: QrFactors | null = null
  let coefficients: Float64Array = new Float64Array(l)

  return {
    points: n,
    parameters: q,
    ...(bounds && { bounds }),
    exactBelow: 1e-28 * squaresOfData,
    coefficients: () => coefficients,
    residuals(shapes, out) {
      norms.fill(0)
      for (let i = 0; i < n; i += 1) {
        model.evaluate(t[i]!, shapes, at)
        out[i] = rootWeights[i]! * (at.fixed - y[i]!)
        for (let c = 0; c < l; c += 1) {
          const value = rootWeights[i]! * at.terms[c]!
          storage[i * l + c] = value
          norms[c] = norms[c]! + value * value
        }
      }
      for (let c = 0; c < l; c += 1) {
        norms[c] = Math.sqrt(norms[c]!)
        if (!(norms[c]! > 0) || norms[c] === Infinity) return false
        for (let i = 0; i < n; i += 1) storage[i * l + c] = storage[i * l + c]! / norms[c]!
      }
      qr = factorQr(storage, n, l, diagonal)
      if (l > 0 && diagonalRatio(qr) < rankTolerance) return false
      applyQTranspose(qr, out)
      coefficients = solveTriangle(qr, out)
      for (let c = 0; c < l; c += 1) {
        coefficients[c] = -coefficients[c]! / norms[c]!
        out[c] = 0
      }
      applyQ(qr, out)
      return out.every(Number.isFinite)
    },
    jacobian(shapes, out) {
      for (let i = 0; i < n; i += 1) {
        model.evaluate(t[i]!, shapes, at)
        for (let s = 0; s < q; s += 1) {
          let slope = at.fixedSlopes[s]!
          for (let c = 0; c < l; c += 1) slope += coefficients[c]! * at.termSlopes[c * q + s]!
          out[i * q + s] = rootWeights[i]! * slope
        }
      }
      for (let s = 0; s < q; s += 1) {
        for (let i = 0; i < n; i += 1) column[i] = out[i * q + s]!
        applyQTranspose(qr!, column)
        column.fill(0, 0, l)
        applyQ(qr!, column)
        for (let i = 0; i < n; i += 1) out[i * q + s] = column[i]!
      }
    },
  }
}
