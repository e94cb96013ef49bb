/** Residuals of a model as functions of its parameters; what is minimised is their sum of squares. */
export interface LeastSquaresProblem {
  /** Number of residuals n. */
  readonly points: number
  /** Number of parameters p. */
  readonly parameters: number
  /** Writes the n residuals at p; false where the model has no finite value there. */
  residuals(p: Float64Array, out: Float64Array): boolean
  /** Writes the n x p derivatives of the residuals, row-major, at the same p as the last call of `residuals`. */
  jacobian(p: Float64Array, out: Float64Array): void
  /** Closed range of each parameter; absent when all are free. */
  readonly bounds?: { readonly low: Float64Array; readonly high: Float64Array }
  /** Sum of squares that is rounding alone: a fit below it is exact. */
  readonly exactBelow?: number
}

/**
 * How a minimisation ended. Only `converged` gives numbers to quote.
 *
 * - `converged`: the residuals are orthogonal to every free direction and the last step changed nothing that matters
 * - `iteration-limit`: still moving
 * - `stalled`: no step lowers the sum of squares, yet the residuals are not orthogonal
 * - `undefined-start`: the model has no value at the starting point
 */
export type ConvergenceCode = "converged" | "iteration-limit" | "stalled" | "undefined-start"

export interface LeastSquaresSolution {
  readonly code: ConvergenceCode
  readonly parameters: Float64Array
  readonly sumOfSquares: number
  readonly iterations: number
  /** Largest cosine of the angle between the residuals and a free column of the Jacobian: 0 at a minimum. */
  readonly gradientCosine: number
  /** Indices of the parameters that lie on their bound. */
  readonly atBound: readonly number[]
}
