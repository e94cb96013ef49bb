import { applyQTranspose, factorQr, solveTriangle } from "./householder-qr"
import type { ConvergenceCode, LeastSquaresProblem, LeastSquaresSolution } from "./least-squares-problem"

const cosineTolerance = 1e-10
const dropTolerance = 1e-12
const stepTolerance = 1e-10
/** Cosine down to which rounding of the residuals may hold up a minimum that no step improves any more. */
const roundingCosine = 1e-6

const squaresOf = (vector: Float64Array) => {
  let sum = 0
  for (let i = 0; i < vector.length; i += 1) sum += vector[i]! * vector[i]!
  return sum
}

/** Everything one iteration needs, allocated once a fit. */
class Workspace {
  readonly residuals: Float64Array
  readonly trialResiduals: Float64Array
  readonly jacobian: Float64Array
  readonly stacked: Float64Array
  readonly target: Float64Array
  readonly diagonal: Float64Array
  readonly norms: Float64Array
  /** Scale of each parameter: the largest column norm met so far. */
  readonly scales: Float64Array
  readonly trial: Float64Array
  readonly frozen: Uint8Array

  constructor(n: number, p: number) {
    this.residuals = new Float64Array(n)
    this.trialResiduals = new Float64Array(n)
    this.jacobian = new Float64Array(n * p)
    this.stacked = new Float64Array((n + p) * p)
    this.target = new Float64Array(n + p)
    this.diagonal = new Float64Array(p)
    this.norms = new Float64Array(p)
    this.scales = new Float64Array(p)
    this.trial = new Float64Array(p)
    this.frozen = new Uint8Array(p)
  }
}

/**
 * Levenberg–Marquardt minimisation of a sum of squares: parameters scaled by their column norms (never decreasing), each
 * step from an orthogonal factorisation of the Jacobian stacked on the damping, damping steered by the ratio of actual to
 * predicted reduction. Bounds are held by projection; a parameter that is pressed against its bound is frozen for the step.
 *
 * Converged means: cosine between residuals and every free column below 1e-10, and the last step lowered the sum of
 * squares by less than 1e-12 of it or moved no parameter by more than 1e-10 of it.
 *
 * @param start one value a parameter, inside the bounds
 * @param iterationLimit of steps tried, 500 by default
 * @see Moré, Lecture Notes in Mathematics 630, 105 (1978); Nielsen, IMM-REP-1999-05 (damping); docs/methods.md
 */
export function levenbergMarquardt(
  problem: LeastSquaresProblem,
  start: ArrayLike<number>,
  iterationLimit = 500,
): LeastSquaresSolution {
  const { points: n, parameters: p } = problem
  const w = new Workspace(n, p)
  const current = Float64Array.from(start)
  if (!problem.residuals(current, w.residuals))
    return solution("undefined-start", problem, current, NaN, 0, NaN)
  let sum = squaresOf(w.residuals)
  let damping = 1e-3
  let growth = 2
  let cosine = linearise(problem, current, w, sum)
  let code: ConvergenceCode = "iteration-limit"
  let iterations = 0
  let settled = false
  for (; iterations < iterationLimit; iterations += 1) {
    if (sum <= (problem.exactBelow ?? 0) || (cosine < cosineTolerance && settled)) {
      code = "converged"
      break
    }
    const predicted = proposeStep(problem, current, w, damping)
    const defined = problem.residuals(w.trial, w.trialResiduals)
    const trialSum = defined ? squaresOf(w.trialResiduals) : Infinity
    const ratio = (sum - trialSum) / predicted
    if (ratio > 1e-4 && trialSum < Infinity) {
      settled = isSettled(current, w.trial, (sum - trialSum) / sum)
      current.set(w.trial)
      w.residuals.set(w.trialResiduals)
      sum = trialSum
      cosine = linearise(problem, current, w, sum)
      damping *= Math.max(0.1, 1 - (2 * ratio - 1) ** 3)
      growth = 2
      continue
    }
    // What is left to gain is below rounding, or no step however short gains anything.
    if (predicted <= 1e-15 * sum || damping > 1e20) {
      code = cosine < roundingCosine ? "converged" : "stalled"
      break
    }
    damping *= growth
    growth *= 2
  }
  if (code === "converged" && sum > 0) {
    sum = polish(problem, current, w, sum)
    cosine = linearise(problem, current, w, sum)
  }
  return solution(code, problem, current, sum, iterations, cosine)
}

/**
 * A few undamped steps from a minimum: near it the sum of squares no longer tells neighbours apart, but the
 * step still does. Kept while steps shrink and the sum stays within its own rounding.
 */
function polish(problem: LeastSquaresProblem, current: Float64Array, w: Workspace, start: number): number {
  let sum = start
  let last = Infinity
  for (let step = 0; step < 50; step += 1) {
    proposeStep(problem, current, w, 0)
    let length = 0
    for (let j = 0; j < current.length; j += 1) length += (w.scales[j]! * (w.trial[j]! - current[j]!)) ** 2
    if (!(length < last) || !problem.residuals(w.trial, w.trialResiduals)) break
    const trialSum = squaresOf(w.trialResiduals)
    if (!(trialSum <= sum * (1 + 1e-12))) break
    last = length
    sum = trialSum
    current.set(w.trial)
    w.residuals.set(w.trialResiduals)
    linearise(problem, current, w, sum)
    if (length <= 1e-28 * sum) break
  }
  problem.residuals(current, w.residuals)
  return sum
}

/** Jacobian, scales and frozen parameters at the current point; returns the largest cosine. */
function linearise(problem: LeastSquaresProblem, at: Float64Array, w: Workspace, sum: number): number {
  const { points: n, parameters: p, bounds } = problem
  problem.jacobian(at, w.jacobian)
  let cosine = 0
  for (let j = 0; j < p; j += 1) {
    let squares = 0
    let gradient = 0
    for (let i = 0; i < n; i += 1) {
      const value = w.jacobian[i * p + j]!
      squares += value * value
      gradient += value * w.residuals[i]!
    }
    w.norms[j] = Math.sqrt(squares)
    w.scales[j] = Math.max(w.scales[j]!, w.norms[j]!) || 1
    w.frozen[j] =
      bounds && ((at[j]! <= bounds.low[j]! && gradient > 0) || (at[j]! >= bounds.high[j]! && gradient < 0))
        ? 1
        : 0
    if (w.frozen[j] === 0 && squares > 0 && sum > 0)
      cosine = Math.max(cosine, Math.abs(gradient) / (w.norms[j]! * Math.sqrt(sum)))
  }
  return cosine
}

/** Writes the trial point into the workspace; returns the reduction that the linear model promises for the free step. */
function proposeStep(problem: LeastSquaresProblem, at: Float64Array, w: Workspace, damping: number): number {
  const { points: n, parameters: p, bounds } = problem
  w.stacked.fill(0)
  for (let j = 0; j < p; j += 1) {
    w.stacked[(n + j) * p + j] = w.frozen[j] === 1 ? 1 : Math.sqrt(damping)
    if (w.frozen[j] === 1) continue
    for (let i = 0; i < n; i += 1) w.stacked[i * p + j] = w.jacobian[i * p + j]! / w.scales[j]!
  }
  w.target.fill(0)
  for (let i = 0; i < n; i += 1) w.target[i] = -w.residuals[i]!
  const qr = factorQr(w.stacked, n + p, p, w.diagonal)
  applyQTranspose(qr, w.target)
  const scaled = solveTriangle(qr, w.target)
  for (let j = 0; j < p; j += 1) {
    const free = at[j]! + scaled[j]! / w.scales[j]!
    w.trial[j] = bounds ? Math.min(Math.max(free, bounds.low[j]!), bounds.high[j]!) : free
  }
  // |r|^2 - |r + J d|^2 = |J d|^2 + 2 damping |D d|^2 for the damped step d.
  let linear = 0
  for (let i = 0; i < n; i += 1) {
    let change = 0
    for (let j = 0; j < p; j += 1) change += w.jacobian[i * p + j]! * (w.trial[j]! - at[j]!)
    linear += change * change
  }
  return linear + 2 * damping * squaresOf(scaled)
}

function isSettled(from: Float64Array, to: Float64Array, relativeDrop: number): boolean {
  if (relativeDrop < dropTolerance) return true
  return from.every((value, j) => Math.abs(to[j]! - value) <= stepTolerance * Math.abs(to[j]!))
}

function solution(
  code: ConvergenceCode,
  { bounds }: LeastSquaresProblem,
  parameters: Float64Array,
  sumOfSquares: number,
  iterations: number,
  gradientCosine: number,
): LeastSquaresSolution {
  const atBound = bounds
    ? [...parameters.keys()].filter(
        (j) => parameters[j]! <= bounds.low[j]! || parameters[j]! >= bounds.high[j]!,
      )
    : []
  return { code, parameters, sumOfSquares, iterations, gradientCosine, atBound }
}
