import { buildEnsemble, EnsembleError } from "@/lib/stats/ensemble/build-ensemble"
import type { Ensemble } from "@/lib/stats/ensemble/ensemble"
import { ensembleMoments } from "@/lib/stats/ensemble/ensemble-moments"
import { ensembleWarnings } from "@/lib/stats/ensemble/ensemble-warnings"
import { logBinEnsemble } from "@/lib/stats/ensemble/log-bin-ensemble"
import { logMoments } from "@/lib/stats/ensemble/log-moments"
import type { StatisticalWarning } from "@/lib/stats/warnings/statistical-warning"
import { bindColumns, numbersOf, type BoundData, type CurveRows } from "../bind-columns"
import { describeCurve } from "../curve-words"
import type { CurveKey, PanelInput } from "../figure-kind"
import type { DataBinding } from "../schema/data-binding"
import type { ReductionParams } from "../schema/panel-parts"
import { SpecError } from "../spec-error"
import { reduceGivenErrors } from "./reduce-given-errors"

/** What stands behind the numbers of a curve. */
export type Origin = "trajectories" | "given-errors" | "no-errors"

/** One curve reduced: what is drawn of it, and what its uncertainty comes from. */
export interface ReducedCurve {
  readonly curve: CurveKey
  /** How it is called in warnings. */
  readonly where: string
  /** Trajectories as the table names them; empty for given errors. */
  readonly ids: readonly string[]
  readonly origin: Origin
  readonly abscissa: Float64Array
  readonly mean: Float64Array
  /** NaN where there is none. */
  readonly standardError: Float64Array
  /**
   * The reduced ensemble, with the reference time in front when it is divided by its first value; null for points with
   * given errors.
   */
  readonly ensemble: Ensemble | null
  /** Index of the reference time in the ensemble, or null. */
  readonly reference: number | null
  readonly warnings: readonly StatisticalWarning[]
}

export interface ReducedCurves {
  readonly bound: BoundData
  readonly curves: readonly ReducedCurve[]
}

/** The part of a panel's parameters that the reduction depends on. */
export interface ReductionWish {
  readonly data: DataBinding
  readonly reduction: ReductionParams
}

/**
 * From a table to one ensemble a curve: binding, filtering, splitting, a common grid, normalisation, logarithmic bins.
 *
 * @param axis the role whose column is the abscissa
 * @throws SpecError with pointers relative to the panel
 */
export function reduceCurves(
  input: PanelInput,
  { data, reduction }: ReductionWish,
  axis: "time" | "coordinate" = "time",
): ReducedCurves {
  const bound = bindColumns(input, data, {
    trajectory: false,
    [axis]: true,
    observable: true,
    uncertainty: false,
    weight: false,
  })
  const curves = bound.curves.map((rows) => reduceCurve(bound, rows, { data, reduction }, axis))
  return { bound, curves }
}

function reduceCurve(
  { columns }: BoundData,
  { curve, rows }: CurveRows,
  { data, reduction }: ReductionWish,
  axis: "time" | "coordinate",
): ReducedCurve {
  const where = describeCurve(data.curveBy, curve)
  const pick = (column: Float64Array) => Float64Array.from(rows, (row) => column[row]!)
  const abscissa = pick(numbersOf(columns.get(axis)!))
  const observable = pick(numbersOf(columns.get("observable")!))
  const trajectory = columns.get("trajectory")
  const uncertainty = columns.get("uncertainty")
  if (!trajectory && uncertainty)
    return {
      ...reduceGivenErrors(abscissa, observable, pick(numbersOf(uncertainty)), reduction),
      curve,
      where,
    }
  const weight = columns.get("weight")
  const table = {
    trajectory: trajectory
      ? Array.from(rows, (row) => trajectory.values[row]!)
      : new Array<number>(rows.length).fill(1),
    abscissa,
    observable,
    ...(weight ? { weight: pick(numbersOf(weight)) } : {}),
  }
  const ensemble = onCommonGrid(table, reduction, where)
  const { scaled, reference } = normalise(ensemble, reduction, where)
  const reduced = reduction.bins ? logBinEnsemble(scaled, reduction.bins.perDecade) : scaled
  // Binning drops t <= 0, so the reference is taken along as a time of its own.
  const { working, at } = withReference(reduced, scaled, reference)
  return {
    curve,
    where,
    ids: working.ids,
    origin: working.ids.length > 1 ? "trajectories" : "no-errors",
    ...drawnMoments(working, at),
    ensemble: working,
    reference: at,
    warnings: ensembleWarnings(ensemble, where),
  }
}

function onCommonGrid(
  table: Parameters<typeof buildEnsemble>[0],
  reduction: ReductionParams,
  where: string,
): Ensemble {
  try {
    return buildEnsemble(table, reduction.unequalGrids)
  } catch (error) {
    if (!(error instanceof EnsembleError)) throw error
    const pointer = error.code === "UNEQUAL_GRIDS" ? "/reduction/unequalGrids" : "/data"
    const code = error.code.toLowerCase().replaceAll("_", "-")
    throw new SpecError([{ pointer, code, message: `${capital(where)}: ${error.message}` }])
  }
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1)

function normalise(ensemble: Ensemble, { normalise: rule }: ReductionParams, where: string) {
  if (rule === "none") return { scaled: ensemble, reference: null }
  if (rule === "initial") {
    const initial = ensembleMoments(ensemble).mean[0]!
    if (!(initial > 0))
      throw new SpecError([
        {
          pointer: "/reduction/normalise",
          code: "no-initial-value",
          message: `${capital(where)}: the mean at the first time is ${initial}, so nothing can be divided by it.`,
        },
      ])
    return { scaled: ensemble, reference: 0 }
  }
  return { scaled: { ...ensemble, values: ensemble.values.map((y) => y / rule.constant) }, reference: null }
}

/** The reduced ensemble with the reference time in front, and its index there; unchanged without a reference. */
function withReference(reduced: Ensemble, full: Ensemble, reference: number | null) {
  if (reference === null) return { working: reduced, at: null }
  const times = full.abscissa.length
  const keep = [...reduced.abscissa.keys()].filter((k) => reduced.abscissa[k]! > full.abscissa[reference]!)
  const columns = keep.length + 1
  const values = new Float64Array(full.ids.length * columns)
  for (let i = 0; i < full.ids.length; i += 1) {
    values[i * columns] = full.values[i * times + reference]!
    keep.forEach((k, c) => {
      values[i * columns + c + 1] = reduced.values[i * reduced.abscissa.length + k]!
    })
  }
  const abscissa = Float64Array.of(full.abscissa[reference]!, ...keep.map((k) => reduced.abscissa[k]!))
  return { working: { ...full, abscissa, values }, at: 0 }
}

/** What is drawn: mean and standard error, or their ratio to the reference time with the error of the ratio. */
function drawnMoments(working: Ensemble, at: number | null) {
  const { mean, standardError } = ensembleMoments(working)
  if (at === null) return { abscissa: working.abscissa, mean, standardError }
  const ratio = logMoments(working, at)
  const base = mean[at]!
  const errorOf = new Map([...ratio.index].map((k, c) => [k, Math.exp(ratio.lnRelativeVariance[c]! / 2)]))
  const shown = [...working.abscissa.keys()].filter((k) => k !== at || working.abscissa[k]! > 0)
  return {
    abscissa: Float64Array.from(shown, (k) => working.abscissa[k]!),
    mean: Float64Array.from(shown, (k) => mean[k]! / base),
    standardError: Float64Array.from(shown, (k) =>
      k === at ? 0 : (errorOf.get(k) ?? Number.NaN) * (mean[k]! / base),
    ),
  }
}
