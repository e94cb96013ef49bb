import { correlationOf } from "../nonlinear/normal-covariance"
import type { StatisticalWarning } from "../warnings/statistical-warning"
import { warn } from "../warnings/warning-catalogue"
import type { LawFit, LawRefusal } from "./fit-law"
import { replicatesOf, refusedShare } from "./law-errors"
import type { JackknifeSummary } from "../resampling/jackknife"
import type { ReplicatedMeans } from "./replicated-means"

/** Parameter names as a sentence says them. */
const words: Readonly<Record<string, string>> = {
  amplitude: "the amplitude",
  exponent: "the exponent",
  offset: "the offset",
  intercept: "the intercept",
  slope: "the slope",
  relaxationTime: "the relaxation time",
  stretching: "the stretching exponent",
  singularTime: "the time of divergence",
  divergenceExponent: "the exponent of divergence",
}
const say = (parameter: string) => words[parameter] ?? parameter
const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1)

/** Why a law has no fit, as a warning. */
export function lawRefusalWarning(
  { refused, points }: { readonly refused: LawRefusal; readonly points: number },
  where: string,
): StatisticalWarning {
  switch (refused) {
    case "TOO_FEW_POINTS":
      return warn("TOO_FEW_POINTS", where, { points })
    case "NONPOSITIVE_MEANS":
      return warn("NONPOSITIVE_MEANS", where, { times: points })
    case "NO_CONVERGENCE":
      return warn("NO_CONVERGENCE", where)
    case "BOUNDARY_SOLUTION":
      return warn("BOUNDARY_SOLUTION", where, { parameter: "A parameter" })
  }
}

/**
 * What the search itself and the shape of the window say about a fit; needs no errors.
 *
 * @see docs/methods.md, laws
 */
export function lawSearchWarnings(fit: LawFit, means: ReplicatedMeans, where: string): StatisticalWarning[] {
  const warnings: StatisticalWarning[] = []
  const { law, parameters, convergence } = fit
  const valueOf = (name: string) => parameters[law.parameters.indexOf(name)]!
  const first = means.abscissa[fit.from]!
  const last = means.abscissa[fit.to - 1]!
  if (!convergence.confirmed) warnings.push(warn("MULTIPLE_MINIMA", where))
  const tooSlow = law.parameters.includes("relaxationTime") && valueOf("relaxationTime") > 2 * (last - first)
  const replicates = fit.replicates.length / parameters.length
  if (convergence.atBound || tooSlow || fit.replicatesAtBound > 0.01 * replicates) {
    const parameter = law.parameters[1] ?? law.parameters[0]!
    warnings.push(warn("BOUNDARY_SOLUTION", where, { parameter: capital(say(parameter)) }))
  }
  const decades = decadesOf(fit, first, last)
  if (decades !== null && decades < 2)
    warnings.push(
      warn(
        "SHORT_RANGE",
        where,
        { decades: decades.toFixed(2) },
        decades < 1 ? "severe" : decades < 1.5 ? "caution" : "note",
      ),
    )
  const failed = replicatesOf(fit, 0).filter(Number.isNaN).length
  if (failed > 0.01 * replicates)
    warnings.push(
      warn(
        "BOOTSTRAP_FAILURES",
        where,
        { percent: ((100 * failed) / replicates).toFixed(1) },
        failed > refusedShare * replicates ? "severe" : "caution",
      ),
    )
  return warnings
}

/** Decades of the variable that a power of is claimed; null for other laws. */
function decadesOf({ law, parameters }: LawFit, first: number, last: number): number | null {
  if (law.id === "finite-time-divergence") {
    const singular = parameters[1]!
    return Math.log10((singular - first) / (singular - last))
  }
  return law.id.startsWith("power-law") ? Math.log10(last / first) : null
}

/** Correlation above which two parameters are not told apart. */
const degenerate = 0.98

/**
 * What the errors say about a fit.
 *
 * @param covariance of the parameters, row-major p x p
 */
export function lawErrorWarnings(fit: LawFit, covariance: Float64Array, where: string): StatisticalWarning[] {
  const { law, parameters } = fit
  const p = parameters.length
  const at = (name: string) => law.parameters.indexOf(name)
  const rivals = law.rivals
    .filter(([a, b]) => Math.abs(correlationOf(covariance, p, at(a), at(b))) > degenerate)
    .map(([a, b]) => ({ first: capital(say(a)), second: say(b) }))
  const simpler = law.simplerAt
    .filter(({ parameter, value }) => {
      const j = at(parameter)
      return Math.abs(parameters[j]! - value) < 2 * Math.sqrt(covariance[j * p + j]!)
    })
    .map(({ parameter, words: other }) => ({ first: capital(say(parameter)), second: other }))
  return [...rivals, ...simpler].map((names) => warn("DEGENERATE", where, names))
}

/** What the deletions say beyond their spread: bias of the logarithm, and single trajectories that carry the error. */
export function lawJackknifeWarnings(
  fit: LawFit,
  errors: readonly JackknifeSummary[],
  means: ReplicatedMeans,
  ids: readonly string[],
  where: string,
): StatisticalWarning[] {
  const warnings: StatisticalWarning[] = []
  if (fit.scale === "log") {
    let worst = 0
    for (let k = fit.from; k < fit.to; k += 1)
      worst = Math.max(worst, Math.sqrt(means.variance[k]!) / means.mean[k]!)
    const biased = errors.find(({ bias, standardError }) => Math.abs(bias) > 0.25 * standardError)
    if (worst > 0.3 || biased) {
      const bias = worst > 0.3 ? (worst * worst) / 2 : Math.abs(biased!.bias)
      warnings.push(warn("LOG_BIAS", where, { bias: String(Number(bias.toPrecision(2))) }))
    }
  }
  const heavy = errors.reduce((a, b) => (b.largestShare > a.largestShare ? b : a))
  if (ids.length >= 20 && heavy.largestShare > 0.25)
    warnings.push(
      warn("HEAVY_TAILS", where, {
        trajectory: ids[heavy.largestIndex]!,
        percent: Math.round(100 * heavy.largestShare),
      }),
    )
  return warnings
}
