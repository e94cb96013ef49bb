import type { Curve } from "../nonlinear/curve-problem"
import type { LeastSquaresProblem } from "../nonlinear/least-squares-problem"

/** Deviance of one count from its expectation, 2 [k ln(k/mu) - (k - mu)]; a zero count gives 2 mu. */
export function poissonDeviance(count: number, expected: number): number {
  if (count === 0) return 2 * expected
  const ratio = (expected - count) / count
  // k [ratio - ln(1 + ratio)] without the cancellation of nearly equal terms.
  return 2 * count * (ratio - Math.log1p(ratio))
}

/**
 * Poisson likelihood as a least-squares problem: residuals are signed roots of the deviances, so that their sum of squares
 * is the deviance and its minimum the maximum of the likelihood. Zero counts stay in.
 *
 * @param curve expected counts, which have to be positive
 * @see McCullagh & Nelder, Generalized Linear Models (1989), section 2.4
 */
export function poissonProblem(curve: Curve, x: Float64Array, counts: Float64Array): LeastSquaresProblem {
  const p = curve.parameters
  const slopes = new Float64Array(p)
  return {
    points: x.length,
    parameters: p,
    residuals(parameters, out) {
      for (let i = 0; i < x.length; i += 1) {
        const expected = curve.value(x[i]!, parameters, slopes)
        if (!(expected > 0) || expected === Infinity) return false
        const deviance = Math.max(0, poissonDeviance(counts[i]!, expected))
        out[i] = Math.sign(expected - counts[i]!) * Math.sqrt(deviance)
      }
      return true
    },
    jacobian(parameters, out) {
      for (let i = 0; i < x.length; i += 1) {
        const expected = curve.value(x[i]!, parameters, slopes)
        const root = Math.sqrt(Math.max(0, poissonDeviance(counts[i]!, expected)))
        // d sqrt(D)/d mu = (1 - k/mu)/sqrt(D), which tends to 1/sqrt(mu) where the expectation meets the count.
        const close = Math.abs(expected - counts[i]!) <= 1e-7 * expected
        const factor = close ? 1 / Math.sqrt(expected) : Math.abs(1 - counts[i]! / expected) / root
        for (let j = 0; j < p; j += 1) out[i * p + j] = factor * slopes[j]!
      }
    },
  }
}
