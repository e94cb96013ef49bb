import { levenbergMarquardt } from "../nonlinear/levenberg-marquardt"
import type { ConvergenceCode } from "../nonlinear/least-squares-problem"
import { bestOfGrid, multiStart } from "../nonlinear/multi-start"
import { separableProblem } from "../nonlinear/separable-problem"
import { logWeights, type LogWeights } from "../power-law/fit-log-line"
import type { Law, LawScale, ScaledLaw } from "./law"
import type { ReplicatedMeans } from "./replicated-means"

export type LawRefusal = "TOO_FEW_POINTS" | "NONPOSITIVE_MEANS" | "NO_CONVERGENCE" | "BOUNDARY_SOLUTION"

/** How the search for the minimum went. */
export interface Convergence {
  readonly code: ConvergenceCode
  readonly iterations: number
  readonly gradientCosine: number
  readonly starts: number
  readonly convergedStarts: number
  /** Whether a second start found the same minimum. */
  readonly confirmed: boolean
  /** Whether a searched parameter lies at the end of its range: what is found there is a bound, not a value. */
  readonly atBound: boolean
}

/** A law fitted to the mean inside a window, and refitted to each replicate of it. */
export interface LawFit {
  readonly law: Law
  readonly scale: LawScale
  /** First and one past the last point used, in the grid of the means. */
  readonly from: number
  readonly to: number
  /** In the order of `law.parameters`. */
  readonly parameters: Float64Array
  /** R x p; a row of NaN where a replicate could not be fitted. */
  readonly replicates: Float64Array
  /** Weighted sum of squares of the whole sample, weights near 1, and of each replicate; NaN where there is no fit. */
  readonly sumOfSquares: number
  readonly replicateSums: Float64Array
  /** Replicates whose fit ran to the end of its range. */
  readonly replicatesAtBound: number
  /** The law at the points used. */
  readonly fitted: Float64Array
  /** (mean - law) / standard error at those points, on the fitted scale; NaN where there is no error. */
  readonly standardised: Float64Array
  /** Sum of their squares. The points are correlated: never a p-value. */
  readonly chiSquare: number
  readonly degreesOfFreedom: number
  /** Root mean square of the unweighted residuals on the fitted scale: relative on the log scale. */
  readonly rootMeanSquare: number
  readonly convergence: Convergence
}

export interface LawFitOptions {
  /** `auto`: logarithms where the law has that form and every mean exceeds three standard errors. */
  readonly scale?: LawScale | "auto"
  readonly weights?: LogWeights
}

/**
 * Weighted least squares of a law on the ensemble mean, repeated on every replicate, weights included. The whole sample
 * is searched from several starts; replicates start at its optimum and, failing that, at the best point of the grid.
 *
 * @param window closed interval of the abscissa; null leaves a side open
 * @returns the fit, or why there is none
 * @see docs/methods.md, laws
 */
export function fitLaw(
  law: Law,
  means: ReplicatedMeans,
  window: readonly [number | null, number | null],
  { scale: wanted = "auto", weights: mode = "smoothed" }: LawFitOptions = {},
): LawFit | { readonly refused: LawRefusal; readonly points: number } {
  const [from, to] = rangeOf(means.abscissa, window, law.positiveTimes)
  const n = to - from
  const p = law.parameters.length
  if (n < p + 1) return { refused: "TOO_FEW_POINTS", points: Math.max(0, n) }
  const scale = chooseScale(law, means, from, to, wanted)
  const row = rowReader(means, from, to, scale, mode)
  if (!row.read(0)) return { refused: "NONPOSITIVE_MEANS", points: row.nonpositive }
  const t = means.abscissa.slice(from, to)
  const scaled = scale === "log" ? law.log!(t) : law.raw(t)
  const bounds = { low: scaled.low, high: scaled.high }
  const problem = separableProblem(scaled.model, t, row.y, row.rootWeights, bounds)
  const search = multiStart(problem, scaled.grid)
  if (search.code !== "converged") return { refused: "NO_CONVERGENCE", points: n }
  const parameters = scaled.assemble(search.parameters, problem.coefficients())
  if (!isReached(law, parameters)) return { refused: "BOUNDARY_SOLUTION", points: n }
  const residuals = new Float64Array(n)
  problem.residuals(search.parameters, residuals)
  for (let k = 0; k < n; k += 1) residuals[k] = -residuals[k]! / row.rootWeights[k]!
  const summary = residualsOf(means, residuals, from, scale)
  const refits = refitReplicates(means, law, scaled, row, t, search.parameters)
  return {
    law,
    scale,
    from,
    to,
    parameters,
    sumOfSquares: search.sumOfSquares,
    ...refits,
    ...summary,
    degreesOfFreedom: n - p,
    convergence: {
      code: search.code,
      iterations: search.iterations,
      gradientCosine: search.gradientCosine,
      starts: search.starts,
      convergedStarts: search.convergedStarts,
      confirmed: search.confirmed,
      atBound: search.atBound.length > 0,
    },
  }
}

/** Whether all parameters have a value; far from a divergence the amplitude alone may overflow. */
function isReached(law: Law, parameters: Float64Array): boolean {
  return parameters.every((value, j) => law.parameters[j] === "amplitude" || Number.isFinite(value))
}

/** Points inside the window, from the first positive time on where the law needs one. */
function rangeOf(
  t: Float64Array,
  [low, high]: readonly [number | null, number | null],
  positiveTimes: boolean,
): readonly [number, number] {
  const slack = 1e-9
  let from = 0
  let to = t.length
  while (
    from < to &&
    ((positiveTimes && t[from]! <= 0) || (low !== null && t[from]! < low - slack * Math.abs(low)))
  )
    from += 1
  while (to > from && high !== null && t[to - 1]! > high + slack * Math.abs(high)) to -= 1
  return [from, to]
}

function chooseScale(
  law: Law,
  { mean, variance }: ReplicatedMeans,
  from: number,
  to: number,
  wanted: LawScale | "auto",
): LawScale {
  if (wanted === "raw" || !law.log) return "raw"
  if (wanted === "log") return "log"
  for (let k = from; k < to; k += 1) if (!(mean[k]! > 3 * Math.sqrt(variance[k]! || 0))) return "raw"
  return "log"
}

/** Ordinates and root weights of one row of the means at a time, in the same arrays. */
function rowReader(
  { abscissa, mean, variance }: ReplicatedMeans,
  from: number,
  to: number,
  scale: LawScale,
  mode: LogWeights,
) {
  const n = to - from
  const y = new Float64Array(n)
  const lnVariance = new Float64Array(n)
  const rootWeights = new Float64Array(n)
  const reader = {
    y,
    rootWeights,
    /** Points of the last row whose logarithm is not defined. */
    nonpositive: 0,
    /** False where the row has a mean without a logarithm. */
    read(row: number): boolean {
      const offset = row * abscissa.length + from
      reader.nonpositive = 0
      for (let k = 0; k < n; k += 1) {
        const m = mean[offset + k]!
        if (scale === "log" && !(m > 0)) reader.nonpositive += 1
        y[k] = scale === "log" ? Math.log(m) : m
        const v = variance[offset + k]!
        lnVariance[k] = Math.log(scale === "log" ? v / (m * m) : v)
      }
      logWeights(lnVariance, 0, 0, n, mode, rootWeights)
      for (let k = 0; k < n; k += 1) rootWeights[k] = Math.sqrt(rootWeights[k]!)
      return reader.nonpositive === 0
    },
  }
  return reader
}

function refitReplicates(
  { replicates: count }: ReplicatedMeans,
  law: Law,
  scaled: ScaledLaw,
  row: ReturnType<typeof rowReader>,
  t: Float64Array,
  optimum: Float64Array,
) {
  const p = law.parameters.length
  const replicates = new Float64Array(count * p).fill(Number.NaN)
  const replicateSums = new Float64Array(count).fill(Number.NaN)
  let replicatesAtBound = 0
  for (let r = 0; r < count; r += 1) {
    if (!row.read(r + 1)) continue
    const problem = separableProblem(scaled.model, t, row.y, row.rootWeights, {
      low: scaled.low,
      high: scaled.high,
    })
    let fit = levenbergMarquardt(problem, optimum)
    if (fit.code !== "converged" || fit.atBound.length > 0) {
      const [again] = bestOfGrid(problem, scaled.grid, 1)
      if (!again) continue
      fit = levenbergMarquardt(problem, again)
    }
    if (fit.code !== "converged") continue
    if (fit.atBound.length > 0) replicatesAtBound += 1
    problem.residuals(fit.parameters, new Float64Array(t.length))
    const parameters = scaled.assemble(fit.parameters, problem.coefficients())
    if (!isReached(law, parameters)) continue
    replicates.set(parameters, r * p)
    replicateSums[r] = fit.sumOfSquares
  }
  return { replicates, replicateSums, replicatesAtBound }
}

function residualsOf(
  { mean, variance }: ReplicatedMeans,
  residuals: Float64Array,
  from: number,
  scale: LawScale,
) {
  const fitted = residuals.map((residual, k) =>
    scale === "log" ? mean[from + k]! * Math.exp(-residual) : mean[from + k]! - residual,
  )
  const standardised = residuals.map((residual, k) => {
    const error = Math.sqrt(variance[from + k]!)
    return error > 0 ? residual / (scale === "log" ? error / mean[from + k]! : error) : Number.NaN
  })
  let chiSquare = 0
  for (const value of standardised) if (!Number.isNaN(value)) chiSquare += value * value
  const squares = residuals.reduce((sum, value) => sum + value * value, 0)
  return { fitted, standardised, chiSquare, rootMeanSquare: Math.sqrt(squares / fitted.length) }
}
