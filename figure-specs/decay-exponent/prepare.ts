import { bootstrapMoments } from "@/lib/stats/ensemble/bootstrap-moments"
import { buildEnsemble, EnsembleError } from "@/lib/stats/ensemble/build-ensemble"
import type { Ensemble } from "@/lib/stats/ensemble/ensemble"
import { ensembleMoments } from "@/lib/stats/ensemble/ensemble-moments"
import { ensembleWarnings } from "@/lib/stats/ensemble/ensemble-warnings"
import { logBinEnsemble } from "@/lib/stats/ensemble/log-bin-ensemble"
import { logMoments, type LogMoments } from "@/lib/stats/ensemble/log-moments"
import type { StatisticalWarning } from "@/lib/stats/warnings/statistical-warning"
import { bindColumns, numbersOf, type BoundData, type CurveRows } from "../bind-columns"
import { describeCurve } from "../curve-words"
import type { CurveKey, PanelInput } from "../figure-kind"
import { SpecError } from "../spec-error"
import type { DecayExponentParams } from "./params"

/** One curve reduced, and everything that any fit window on it needs. */
export interface PreparedCurve {
  readonly curve: CurveKey
  readonly ids: readonly string[]
  readonly abscissa: Float64Array
  readonly mean: Float64Array
  readonly standardError: Float64Array
  /** Moments of the deletions of one trajectory; for given errors, of the points themselves, without replicates. */
  readonly moments: LogMoments
  /** Moments of resamples, where the interval asks for them. */
  readonly resampled: LogMoments | null
  readonly origin: "trajectories" | "given-errors" | "no-errors"
  readonly warnings: readonly StatisticalWarning[]
}

export interface PreparedDecay {
  readonly bound: BoundData
  readonly curves: readonly PreparedCurve[]
}

/**
 * The part of the computation that does not depend on the fit window: binding, filtering, reduction, deletions and
 * resamples. The editor keeps it while a window is dragged.
 *
 * @throws SpecError with pointers relative to the panel
 */
export function prepareDecay(
  input: PanelInput,
  params: DecayExponentParams,
  onProgress?: (done: number, total: number) => void,
): PreparedDecay {
  const bound = bindColumns(input, params.data, {
    trajectory: false,
    time: true,
    observable: true,
    uncertainty: false,
    weight: false,
  })
  const curves = bound.curves.map((rows, index) => {
    const from = index / bound.curves.length
    return prepareCurve(bound, rows, params, (share) => onProgress?.(from + share / bound.curves.length, 1))
  })
  return { bound, curves }
}

function prepareCurve(
  bound: BoundData,
  { curve, rows }: CurveRows,
  params: DecayExponentParams,
  onProgress: (share: number) => void,
): PreparedCurve {
  const where = describeCurve(params.data.curveBy, curve)
  const pick = (column: Float64Array) => Float64Array.from(rows, (row) => column[row]!)
  const time = pick(numbersOf(bound.columns.get("time")!))
  const observable = pick(numbersOf(bound.columns.get("observable")!))
  const trajectory = bound.columns.get("trajectory")
  const uncertainty = bound.columns.get("uncertainty")
  if (!trajectory && uncertainty)
    return prepareGiven(curve, time, observable, pick(numbersOf(uncertainty)), params)

  const weight = bound.columns.get("weight")
  const ensemble = reduce(
    {
      trajectory: trajectory
        ? Array.from(rows, (row) => trajectory.values[row]!)
        : new Array<number>(rows.length).fill(1),
      abscissa: time,
      observable,
      ...(weight ? { weight: pick(numbersOf(weight)) } : {}),
    },
    params,
    where,
  )
  const { values: scaled, reference } = normalise(ensemble, params, where)
  const reduced = params.reduction.bins ? logBinEnsemble(scaled, params.reduction.bins.perDecade) : scaled
  // Binning drops t <= 0, so the reference is taken along as a time of its own.
  const { working, at } = withReference(reduced, scaled, reference)
  const { mean, standardError } = drawnMoments(working, at)
  const moments = logMoments(working, at)
  const { method, resamples, seed } = params.fit?.interval ?? { method: "jackknife-t", resamples: 0, seed: 0 }
  const needsResamples = params.fit !== null && method !== "jackknife-t" && working.ids.length >= 10
  return {
    curve,
    ids: working.ids,
    abscissa: working.abscissa.filter((_, k) => k !== at || working.abscissa[k]! > 0),
    mean,
    standardError,
    moments,
    resampled: needsResamples
      ? bootstrapMoments(working, moments, at, { resamples, seed }, (done) => onProgress(done / resamples))
      : null,
    origin: working.ids.length > 1 ? "trajectories" : "no-errors",
    warnings: ensembleWarnings(ensemble, where),
  }
}

function reduce(
  table: Parameters<typeof buildEnsemble>[0],
  params: DecayExponentParams,
  where: string,
): Ensemble {
  try {
    return buildEnsemble(table, params.reduction.unequalGrids)
  } catch (error) {
    if (!(error instanceof EnsembleError)) throw error
    const pointer = error.code === "UNEQUAL_GRIDS" ? "/reduction/unequalGrids" : "/data"
    throw new SpecError([
      {
        pointer,
        code: error.code.toLowerCase().replaceAll("_", "-"),
        message: `${capital(where)}: ${error.message}`,
      },
    ])
  }
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1)

function normalise(ensemble: Ensemble, { reduction }: DecayExponentParams, where: string) {
  if (reduction.normalise === "none") return { values: ensemble, reference: null }
  if (reduction.normalise === "initial") {
    const initial = ensembleMoments(ensemble).mean[0]!
    if (!(initial > 0))
      throw new SpecError([
        {
          pointer: "/reduction/normalise",
          code: "no-initial-value",
          message: `${capital(where)}: the mean at the first time is ${initial}, so nothing can be divided by it.`,
        },
      ])
    return { values: ensemble, reference: 0 }
  }
  const { constant } = reduction.normalise
  return { values: { ...ensemble, values: ensemble.values.map((y) => y / constant) }, reference: null }
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
  if (at === null) return { mean, standardError }
  const ratio = logMoments(working, at)
  const base = mean[at]!
  const errorOf = new Map([...ratio.index].map((k, c) => [k, Math.exp(ratio.lnRelativeVariance[c]! / 2)]))
  const shown = [...working.abscissa.keys()].filter((k) => k !== at || working.abscissa[k]! > 0)
  return {
    mean: Float64Array.from(shown, (k) => mean[k]! / base),
    standardError: Float64Array.from(shown, (k) =>
      k === at ? 0 : (errorOf.get(k) ?? Number.NaN) * (mean[k]! / base),
    ),
  }
}

/** Points with errors of their own and no trajectories behind them. */
function prepareGiven(
  curve: CurveKey,
  time: Float64Array,
  observable: Float64Array,
  uncertainty: Float64Array,
  params: DecayExponentParams,
): PreparedCurve {
  const bad = uncertainty.findIndex((sigma) => !(sigma > 0))
  if (bad >= 0)
    throw new SpecError([
      {
        pointer: "/data/columns/uncertainty",
        code: "bad-uncertainty",
        message: `The uncertainty at ${time[bad]} is ${uncertainty[bad]}; every point needs a positive one.`,
      },
    ])
  const { normalise: rule } = params.reduction
  if (rule === "initial")
    throw new SpecError([
      {
        pointer: "/reduction/normalise",
        code: "no-covariance",
        message:
          "Points with given errors carry no covariance with the first one; divide by a constant instead.",
      },
    ])
  const scale = typeof rule === "object" ? 1 / rule.constant : 1
  const order = Array.from(time.keys()).sort((a, b) => time[a]! - time[b]!)
  const abscissa = Float64Array.from(order, (k) => time[k]!)
  const mean = Float64Array.from(order, (k) => observable[k]! * scale)
  const standardError = Float64Array.from(order, (k) => uncertainty[k]! * Math.abs(scale))
  const index = Int32Array.from([...abscissa.keys()].filter((k) => abscissa[k]! > 0))
  return {
    curve,
    ids: [],
    abscissa,
    mean,
    standardError,
    moments: {
      x: Float64Array.from(index, (k) => Math.log(abscissa[k]!)),
      index,
      trajectories: 0,
      replicates: 0,
      lnMean: Float64Array.from(index, (k) => Math.log(mean[k]!)),
      lnRelativeVariance: Float64Array.from(
        index,
        (k) => 2 * Math.log(standardError[k]! / Math.abs(mean[k]!)),
      ),
    },
    resampled: null,
    origin: "given-errors",
    warnings: [],
  }
}
