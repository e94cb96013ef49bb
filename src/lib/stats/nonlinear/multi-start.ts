import { randomStream } from "../random/random-stream"
import type { LeastSquaresProblem, LeastSquaresSolution } from "./least-squares-problem"
import { levenbergMarquardt } from "./levenberg-marquardt"

/** Relative difference of the sums of squares up to which two starts found the same minimum. */
const agreement = 1e-6
const randomStarts = 6

export interface MultiStartSolution extends LeastSquaresSolution {
  /** Starts tried and those of them that converged. */
  readonly starts: number
  readonly convergedStarts: number
  /** Whether a second start found the same minimum. */
  readonly confirmed: boolean
}

/**
 * The best of several Levenberg–Marquardt runs: from the two best points of a grid, from points given, and from six
 * random ones inside the bounds. One start alone proves nothing, so the result says whether a second agrees.
 *
 * @param grid points to rate before the search, none when `given` suffices
 * @param given starts to use in any case
 * @see docs/methods.md, nonlinear fits
 */
export function multiStart(
  problem: LeastSquaresProblem,
  grid: readonly Float64Array[],
  given: readonly Float64Array[] = [],
): MultiStartSolution {
  const starts = [...given, ...bestOfGrid(problem, grid, 2), ...randomPoints(problem)]
  const runs = starts.map((start) => levenbergMarquardt(problem, start))
  const defined = runs
    .filter(({ sumOfSquares }) => !Number.isNaN(sumOfSquares))
    .sort((a, b) => a.sumOfSquares - b.sumOfSquares)
  const converged = defined.filter(({ code }) => code === "converged")
  const [best, second] = converged
  const lowest = defined[0] ?? runs[0]!
  const room = agreement * (best?.sumOfSquares ?? 0) + (problem.exactBelow ?? 0)
  // A run that got lower without converging shows that the converged ones are not the minimum.
  if (!best || best.sumOfSquares - lowest.sumOfSquares > room)
    return { ...lowest, starts: runs.length, convergedStarts: converged.length, confirmed: false }
  // The evaluation state of the problem (linear coefficients) is left at the best point.
  problem.residuals(best.parameters, new Float64Array(problem.points))
  return {
    ...best,
    starts: runs.length,
    convergedStarts: converged.length,
    confirmed:
      problem.parameters === 0 || (second !== undefined && second.sumOfSquares - best.sumOfSquares <= room),
  }
}

/** The points of a grid with the smallest sums of squares, best first; those without a value are left out. */
export function bestOfGrid(
  problem: LeastSquaresProblem,
  grid: readonly Float64Array[],
  count: number,
): Float64Array[] {
  const residuals = new Float64Array(problem.points)
  const rated = grid.flatMap((point) =>
    problem.residuals(point, residuals)
      ? [{ point, sum: residuals.reduce((sum, value) => sum + value * value, 0) }]
      : [],
  )
  return rated
    .sort((a, b) => a.sum - b.sum)
    .slice(0, count)
    .map(({ point }) => point)
}

/** Points uniform inside the bounds, always the same ones; none without finite bounds. */
function randomPoints({ parameters, bounds }: LeastSquaresProblem): Float64Array[] {
  if (!bounds || parameters === 0) return []
  const stream = randomStream(0, 0)
  return Array.from({ length: randomStarts }, () =>
    bounds.low.map((low, j) => low + stream.uniform() * (bounds.high[j]! - low)),
  )
}
