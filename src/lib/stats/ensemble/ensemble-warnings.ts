import { warn } from "../warnings/warning-catalogue"
import type { StatisticalWarning } from "../warnings/statistical-warning"
import { effectiveTrajectories } from "./ensemble-moments"
import type { Ensemble } from "./ensemble"

/** Coverage of a nominal 95 % jackknife-t interval that was measured for ensembles of this size; docs/methods.md, coverage. */
const measuredCoverage = (trajectories: number) => (trajectories < 20 ? 91 : trajectories < 50 ? 92 : 94)

/**
 * What a referee would ask about an ensemble before any fit: too few trajectories, repeated ones, values that are
 * missing, trajectories that end early.
 *
 * @param where names the curve in the warnings
 */
export function ensembleWarnings(ensemble: Ensemble, where: string): StatisticalWarning[] {
  const { abscissa, values, ids } = ensemble
  const trajectories = ids.length
  const times = abscissa.length
  const warnings: StatisticalWarning[] = []
  if (trajectories === 1) return [warn("SINGLE_TRAJECTORY", where)]

  const effective = Math.floor(effectiveTrajectories(ensemble))
  if (effective < 50)
    warnings.push(
      warn(
        "FEW_TRAJECTORIES",
        where,
        { trajectories: effective, coverage: measuredCoverage(effective) },
        effective < 10 ? "severe" : effective < 20 ? "caution" : "note",
      ),
    )

  const seen = new Map<string, number>()
  for (let i = 0; i < trajectories; i += 1) {
    const row = values.subarray(i * times, (i + 1) * times)
    const varies = row.some((value) => value !== row[0])
    if (!varies || times < 3) continue
    const key = row.join(",")
    const twin = seen.get(key)
    if (twin !== undefined) {
      warnings.push(warn("DUPLICATE_TRAJECTORIES", where, { first: ids[twin]!, second: ids[i]! }))
      break
    }
    seen.set(key, i)
  }

  const missing = Array.from({ length: times }, (_, k) => {
    let n = 0
    for (let i = 0; i < trajectories; i += 1) if (Number.isNaN(values[i * times + k]!)) n += 1
    return n
  })
  const gaps = missing.filter((n) => n > 0 && n < trajectories)
  if (gaps.length > 0) {
    const percent = Math.ceil((100 * Math.max(...gaps)) / trajectories)
    warnings.push(warn("MISSING_POINTS", where, { times: gaps.length, percent }))
  }
  const ended = ids.filter((_, i) => Number.isNaN(values[(i + 1) * times - 1]!)).length
  if (ended > 0 && ended < trajectories) warnings.push(warn("SURVIVOR_BIAS", where, { ended }))
  return warnings
}
