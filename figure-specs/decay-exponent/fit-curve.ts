import type { Quantity } from "@/lib/domain/quantity"
import { lineError } from "@/lib/stats/power-law/fit-power-law"
import type { StatisticalWarning } from "@/lib/stats/warnings/statistical-warning"
import { warn } from "@/lib/stats/warnings/warning-catalogue"
import { curveQuantities } from "./curve-quantities"
import { evidenceOf, type Evidence } from "./evidence"
import type { DecayExponentParams } from "./params"
import type { PreparedCurve } from "../ensemble/prepare-curves"
import type { DecayFitResult } from "./result"

export interface FittedCurve {
  readonly fit: DecayFitResult | null
  readonly quantities: readonly Quantity[]
  readonly warnings: readonly StatisticalWarning[]
}

/** Fits one prepared curve in the spec's window; cheap enough for every step of a drag. */
export function fitDecayCurve(prepared: PreparedCurve, params: DecayExponentParams): FittedCurve {
  const { fit } = params
  if (!fit) return { fit: null, quantities: [], warnings: [] }
  const { where } = prepared
  const evidence = evidenceOf(prepared, fit, where)
  if ("refusal" in evidence) return { fit: null, quantities: [], warnings: [evidence.refusal] }
  const drawn = drawLine(prepared, evidence, fit.band.kind !== "none")
  const notes = drawn.outside.includes(true) ? [warn("EXTRAPOLATED_BAND", where)] : []
  if (fit.band.kind === "pointwise" && drawn.bandLow) notes.push(warn("POINTWISE_BAND", where))
  return {
    fit: drawn,
    quantities: curveQuantities(prepared, evidence, params, fit),
    warnings: [...evidence.warnings, ...notes],
  }
}

/** How far beyond the window the dashed continuation goes: half a decade, and never beyond the data. */
const reach = Math.LN10 / 2
const gridPerDecade = 24

function drawLine(prepared: PreparedCurve, evidence: Evidence, withBand: boolean): DecayFitResult {
  const { x } = prepared.moments
  const { line, errors, bandFactor } = evidence
  const first = x[evidence.from]!
  const last = x[evidence.to - 1]!
  const start = Math.max(x[0]!, first - reach)
  const end = Math.min(x[x.length - 1]!, last + reach)
  const steps = (a: number, b: number) => {
    const n = Math.max(1, Math.ceil(((b - a) / Math.LN10) * gridPerDecade))
    return Array.from({ length: n }, (_, k) => a + ((b - a) * k) / n)
  }
  const grid = [
    ...(start < first ? steps(start, first) : []),
    ...steps(first, last),
    ...(end > last ? steps(last, end) : []),
    Math.max(end, last),
  ]
  const at = (lnT: number) => line.level + line.slope * (lnT - line.centre)
  const band = (side: 1 | -1) =>
    withBand && errors && bandFactor !== null
      ? grid.map((lnT) => Math.exp(at(lnT) + side * bandFactor * lineError(line, errors, lnT)))
      : null
  return {
    exponent: line.slope,
    amplitude: Math.exp(at(0)),
    window: evidence.window,
    grid: grid.map(Math.exp),
    line: grid.map((lnT) => Math.exp(at(lnT))),
    bandLow: band(-1),
    bandHigh: band(1),
    outside: grid.map((lnT) => lnT < first || lnT > last),
  }
}
