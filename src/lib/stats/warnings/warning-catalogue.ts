import type { StatisticalWarning, WarningSeverity } from "./statistical-warning"

interface Entry {
  readonly severity: WarningSeverity
  readonly sentence: string
}

/**
 * Every statistical warning: its usual severity and its sentence, with {names} to fill in. The triggers stand beside the
 * estimators; they are heuristics of good practice, not calibrated tests. @see docs/methods.md, warnings
 */
export const warningCatalogue = {
  SHORT_RANGE: {
    severity: "caution",
    sentence:
      "The fit window spans {decades} decades; a power law cannot be told from a curve over so short a range.",
  },
  FEW_TRAJECTORIES: {
    severity: "caution",
    sentence:
      "Only {trajectories} independent trajectories: the true coverage of a 95 % interval is nearer {coverage} %.",
  },
  SINGLE_TRAJECTORY: {
    severity: "severe",
    sentence: "One trajectory has no ensemble error; the fit is descriptive.",
  },
  UNEQUAL_GRIDS: {
    severity: "severe",
    sentence: "Trajectories are sampled at different times; choose inner join, interpolation or bins.",
  },
  MISSING_POINTS: {
    severity: "caution",
    sentence: "{times} times miss up to {percent} % of the trajectories and are left out of the fit.",
  },
  SURVIVOR_BIAS: {
    severity: "severe",
    sentence: "{ended} trajectories end early: late times average only the surviving ones.",
  },
  DUPLICATE_TRAJECTORIES: {
    severity: "severe",
    sentence: "Trajectories {first} and {second} are identical: the same seed twice?",
  },
  NONPOSITIVE_MEANS: {
    severity: "severe",
    sentence: "The mean is not significantly positive at {times} times; a log–log fit is not defined there.",
  },
  LOG_BIAS: {
    severity: "caution",
    sentence:
      "Noise biases the logarithm of the mean by about {bias}; shorten the window or add trajectories.",
  },
  HEAVY_TAILS: {
    severity: "caution",
    sentence: "Trajectory {trajectory} carries {percent} % of the squared error; intervals are optimistic.",
  },
  BAD_CHI2: {
    severity: "caution",
    sentence: "The law does not describe the mean within its (correlated) errors (p = {p}).",
  },
  CHI2_TOO_SMALL: {
    severity: "caution",
    sentence: "Scatter is smaller than the stated errors; are they standard errors of the mean?",
  },
  RUNNING_EXPONENT_DRIFT: {
    severity: "caution",
    sentence: "The local exponent changes by {drift} per decade inside the window.",
  },
  WINDOW_SENSITIVE: {
    severity: "caution",
    sentence:
      "The exponent depends on where the window starts: it moves by {shift} standard errors when the start is doubled.",
  },
  FINITE_SIZE_SUSPECT: { severity: "caution", sentence: "Late times may feel the system size." },
  MODEL_RANK_UNSAFE: {
    severity: "caution",
    sentence: "Too few points or too narrow a range to rank the laws; both are shown.",
  },
  SHARED_EXPONENT_REJECTED: {
    severity: "caution",
    sentence: "The curves do not share one exponent (p = {p}).",
  },
  DEGENERATE: { severity: "caution", sentence: "{first} and {second} cannot be told apart in this window." },
  BOUNDARY_SOLUTION: {
    severity: "severe",
    sentence: "{parameter} runs to the edge of its range; only a bound is given.",
  },
  MULTIPLE_MINIMA: { severity: "severe", sentence: "Different starting values give different fits." },
  NO_CONVERGENCE: { severity: "severe", sentence: "The fit did not converge; no numbers are quoted." },
  BOOTSTRAP_FAILURES: { severity: "caution", sentence: "{percent} % of the resamples could not be fitted." },
  EXTRAPOLATED_BAND: {
    severity: "note",
    sentence: "The dashed part of the fit lies outside its window: it is extrapolation.",
  },
  POINTWISE_BAND: {
    severity: "note",
    sentence: "The band is pointwise; the whole curve lies inside it with lower probability than its level.",
  },
  INTERPOLATED: {
    severity: "note",
    sentence: "{percent} % of the values were interpolated onto the common grid.",
  },
  COUNTS_LOW: { severity: "note", sentence: "Counts are small; Poisson intervals are used." },
  OVERDISPERSED: { severity: "caution", sentence: "Counts scatter more than Poisson by a factor {factor}." },
  THRESHOLD_DEPENDENCE: { severity: "caution", sentence: "The velocity depends on the chosen threshold." },
  NORMALISATION: { severity: "caution", sentence: "The distribution sums to {sum}, not {expected}." },
  SCALE_AMBIGUOUS: {
    severity: "caution",
    sentence: "State whether the errors are standard errors, standard deviations or 95 % half-widths.",
  },
  SELECTED_WINDOW: {
    severity: "note",
    sentence: "The window was chosen by looking at the data; its choice is not in the error.",
  },
  TOO_FEW_POINTS: {
    severity: "severe",
    sentence:
      "Only {points} points lie in the fit window; a line through them is not a fit. Widen the window.",
  },
  SCATTER_EXCEEDS_ERRORS: {
    severity: "caution",
    sentence:
      "The points scatter more than their stated errors (chi-square per degree of freedom {ratio}); the error of the fit is optimistic.",
  },
  NOT_SATURATED: {
    severity: "caution",
    sentence:
      "The value changes by {change} standard errors between the halves of the window: it may not have saturated.",
  },
  SMALL_CHANGE: {
    severity: "caution",
    sentence:
      "The observable changes by less than a factor of 2 in the window: the exponent is a drift, not a law.",
  },
  SERIES_TOO_SHORT: {
    severity: "severe",
    sentence: "The series spans only {times} autocorrelation times; below 50 its error is not to be trusted.",
  },
  NOT_STATIONARY: {
    severity: "severe",
    sentence:
      "The first and the second half of the series differ by {shift} standard errors: it has no stationary mean.",
  },
  FRONT_NOT_STRAIGHT: {
    severity: "caution",
    sentence: "The arrival times bend: one velocity does not describe the front over these positions.",
  },
  COLLAPSE_POOR: {
    severity: "caution",
    sentence: "The curves do not fall onto one another within their errors (S = {quality}).",
  },
  NONLINEAR_ERRORS: {
    severity: "note",
    sentence:
      "Resampled errors differ by up to {percent} % from the analytic ones: the law is not linear within its errors.",
  },
} as const satisfies Record<string, Entry>

export type WarningCode = keyof typeof warningCatalogue

/**
 * Makes a warning from the catalogue.
 *
 * @param where what it speaks of, such as "curve nu = 0.2"
 * @param values the numbers of this case; every {name} of the sentence has to be there
 * @throws Error when a name of the sentence has no value
 */
export function warn(
  code: WarningCode,
  where: string,
  values: Readonly<Record<string, string | number>> = {},
  severity: WarningSeverity = warningCatalogue[code].severity,
): StatisticalWarning {
  const message = warningCatalogue[code].sentence.replace(/\{(\w+)\}/g, (_, name: string) => {
    const value = values[name]
    if (value === undefined) throw new Error(`Warning ${code} needs a value for {${name}}.`)
    return String(value)
  })
  return { code, severity, message, where }
}
