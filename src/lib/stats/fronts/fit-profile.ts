import type { ConvergenceCode } from "../nonlinear/least-squares-problem"
import { multiStart } from "../nonlinear/multi-start"
import { separableProblem, type SeparableModel } from "../nonlinear/separable-problem"
import { productGrid, spaced } from "../laws/law"

/** `pulse`: sech^2((x - x0)/w). `edge`: (1 + tanh((x - x0)/w))/2. Both with amplitude and background. */
export type ProfileShape = "pulse" | "edge"

export interface ProfileFit {
  readonly centre: number
  /** w of the shape, positive. */
  readonly width: number
  readonly amplitude: number
  readonly background: number
  /** Full width at half maximum of a pulse, 1.7627 w; distance of the 10 % and 90 % levels of an edge, 2.1972 w. */
  readonly conventionalWidth: number
  readonly code: ConvergenceCode
  readonly confirmed: boolean
  /** The width or the centre runs to the end of the range of positions. */
  readonly atBound: boolean
}

/** 2 arcosh(sqrt 2) and ln 9. */
const conventional: Readonly<Record<ProfileShape, number>> = {
  pulse: 2 * Math.acosh(Math.SQRT2),
  edge: Math.log(9),
}

/** Shapes: centre and ln w; terms: the shape and 1. */
const models: Readonly<Record<ProfileShape, SeparableModel>> = {
  pulse: {
    shapes: 2,
    coefficients: 2,
    evaluate(x, [centre, logWidth], out) {
      const width = Math.exp(logWidth!)
      const z = (x - centre!) / width
      const tangent = Math.tanh(z)
      const height = 1 - tangent * tangent
      out.terms[0] = height
      out.terms[1] = 1
      out.termSlopes[0] = (2 * height * tangent) / width
      out.termSlopes[1] = 2 * height * tangent * z
      out.termSlopes[2] = 0
      out.termSlopes[3] = 0
    },
  },
  edge: {
    shapes: 2,
    coefficients: 2,
    evaluate(x, [centre, logWidth], out) {
      const width = Math.exp(logWidth!)
      const z = (x - centre!) / width
      const tangent = Math.tanh(z)
      out.terms[0] = (1 + tangent) / 2
      out.terms[1] = 1
      out.termSlopes[0] = -(1 - tangent * tangent) / (2 * width)
      out.termSlopes[1] = (-(1 - tangent * tangent) * z) / 2
      out.termSlopes[2] = 0
      out.termSlopes[3] = 0
    },
  },
}

/**
 * Least-squares fit of a localised structure to a mean profile. Errors come from repeating it on deletions or resamples.
 *
 * @param x positions, increasing; @param profile values; @param rootWeights square roots of weights; all of length n >= 5
 * @returns null with fewer than five points or when no start converges
 * @see docs/methods.md, widths of a profile
 */
export function fitProfile(
  shape: ProfileShape,
  x: Float64Array,
  profile: Float64Array,
  rootWeights: Float64Array = new Float64Array(x.length).fill(1),
): ProfileFit | null {
  const n = x.length
  if (n < 5) return null
  const length = x[n - 1]! - x[0]!
  const low = Float64Array.of(x[0]!, Math.log(length / n / 10))
  const high = Float64Array.of(x[n - 1]!, Math.log(10 * length))
  const problem = separableProblem(models[shape], x, profile, rootWeights, { low, high })
  const widths = spaced(Math.log(length / n), Math.log(length / 2), 6)
  const search = multiStart(problem, productGrid(spaced(low[0]!, high[0]!, 12), widths))
  if (search.code !== "converged") return null
  const [centre, logWidth] = search.parameters
  const [amplitude, background] = problem.coefficients()
  const width = Math.exp(logWidth!)
  return {
    centre: centre!,
    width,
    amplitude: amplitude!,
    background: background!,
    conventionalWidth: conventional[shape] * width,
    code: search.code,
    confirmed: search.confirmed,
    atBound: search.atBound.length > 0,
  }
}
