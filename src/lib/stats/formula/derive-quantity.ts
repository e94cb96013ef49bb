import { tQuantile } from "../distributions/t-quantile"
import { jackknife } from "../resampling/jackknife"
import type { Formula } from "./parse-formula"

/**
 * Quantities that rest on one ensemble: they share its deletions and its resamples, so that their correlations enter the
 * error of whatever is computed from them.
 */
export interface QuantitySource {
  /** Estimate of each quantity by its name. */
  readonly estimates: ReadonlyMap<string, number>
  /** Each quantity without trajectory i, all of length M. */
  readonly deletions: ReadonlyMap<string, Float64Array>
  /** Each quantity on resample b, all of length B; absent when not resampled. */
  readonly resamples?: ReadonlyMap<string, Float64Array>
}

export interface DerivedQuantity {
  readonly value: number
  /** Jackknife over the trajectories of every source, added in squares; sources are independent of each other. */
  readonly standardError: number
  /** The same linearised about the estimate: a check, which differs where the formula bends within the errors. */
  readonly deltaError: number
  /** Effective degrees of freedom for t quantiles; M - 1 for a single source. */
  readonly degreesOfFreedom: number
}

/**
 * A number by formula, with its error: the formula is evaluated on every deletion of every source.
 *
 * @param sources whose names are distinct and cover the formula's
 * @see docs/methods.md, derived quantities; Welch, Biometrika 34, 28 (1947) for the degrees of freedom
 */
export function deriveQuantity(formula: Formula, sources: readonly QuantitySource[]): DerivedQuantity {
  const estimates = new Map(sources.flatMap((source) => [...source.estimates]))
  const value = formula.evaluate(estimates)
  let variance = 0
  let deltaVariance = 0
  let denominator = 0
  for (const source of sources) {
    const names = formula.names.filter((name) => source.estimates.has(name))
    if (names.length === 0) continue
    const own = jackknife(value, evaluateEach(formula, estimates, names, source.deletions))
    const linear = linearised(formula, estimates, names, source.deletions)
    const trajectories = linear.length
    variance += own.standardError ** 2
    deltaVariance += jackknife(0, linear).standardError ** 2
    denominator += own.standardError ** 4 / (trajectories - 1)
  }
  return {
    value,
    standardError: Math.sqrt(variance),
    deltaError: Math.sqrt(deltaVariance),
    degreesOfFreedom: variance ** 2 / denominator,
  }
}

/** Quoted interval of a derived quantity: value +- t standard errors. */
export function derivedInterval(
  { value, standardError, degreesOfFreedom }: DerivedQuantity,
  level: number,
): readonly [number, number] {
  const half = tQuantile((1 + level) / 2, degreesOfFreedom) * standardError
  return [value - half, value + half]
}

/**
 * The formula on every resample, for bands and asymmetric intervals. Resample b of the second source is paired with
 * resample b + 1 of the first, and so on: the same seed draws the same trajectories, and independent ensembles must not
 * share their draws.
 *
 * @returns null when a source that the formula needs was not resampled
 */
export function deriveResamples(formula: Formula, sources: readonly QuantitySource[]): Float64Array | null {
  const needed = sources.filter(({ estimates }) => formula.names.some((name) => estimates.has(name)))
  const columns = new Map<string, Float64Array>()
  for (const [shift, { estimates, resamples }] of needed.entries())
    for (const name of formula.names) {
      if (!estimates.has(name)) continue
      const column = resamples?.get(name)
      if (!column) return null
      columns.set(name, rotated(column, shift))
    }
  const length = Math.min(...[...columns.values()].map((column) => column.length))
  if (length === Infinity) return null
  const cut = new Map([...columns].map(([name, column]) => [name, column.subarray(0, length)]))
  return evaluateEach(formula, new Map(), [...columns.keys()], cut)
}

const rotated = (column: Float64Array, shift: number) =>
  column.map((_, b) => column[(b + shift) % column.length]!)

/** The formula with some names replaced by each of their replicates in turn. */
function evaluateEach(
  formula: Formula,
  estimates: ReadonlyMap<string, number>,
  names: readonly string[],
  replicates: ReadonlyMap<string, Float64Array>,
): Float64Array {
  const values = new Map(estimates)
  return replicates.get(names[0]!)!.map((_, r) => {
    for (const name of names) values.set(name, replicates.get(name)![r]!)
    return formula.evaluate(values)
  })
}

/** First-order change of the formula on each deletion. */
function linearised(
  formula: Formula,
  estimates: ReadonlyMap<string, number>,
  names: readonly string[],
  deletions: ReadonlyMap<string, Float64Array>,
): Float64Array {
  const change = new Float64Array(deletions.get(names[0]!)!.length)
  for (const name of names) {
    const column = deletions.get(name)!
    const estimate = estimates.get(name)!
    const h =
      Math.cbrt(Number.EPSILON) * Math.max(Math.abs(estimate), jackknife(estimate, column).standardError)
    if (h === 0) continue
    const at = (moved: number) => formula.evaluate(new Map(estimates).set(name, moved))
    const slope = (at(estimate + h) - at(estimate - h)) / (2 * h)
    column.forEach((value, i) => (change[i] = change[i]! + slope * (value - estimate)))
  }
  return change
}
