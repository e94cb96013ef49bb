import { jackknife } from "@/lib/stats/resampling/jackknife"
import type { Ensemble } from "@/lib/stats/ensemble/ensemble"
import type { ReducedCurve } from "./reduce-curves"

/** An observable averaged over a window of the abscissa. */
export interface WindowMean {
  readonly value: number
  /** null without trajectories to leave out and without given errors. */
  readonly standardError: number | null
  /** Ends of the window that was used, both points of the grid. */
  readonly window: readonly [number, number]
  readonly points: number
  /** Second half minus first half of the window, with its error: what has saturated does not change. */
  readonly change: { readonly value: number; readonly standardError: number } | null
}

/**
 * Averages a curve over a window: every trajectory first, then over trajectories, so that the error is that of whole
 * trajectories; divided by the mean at the reference time where the curve is. Points with given errors are weighted by
 * their inverse variance.
 *
 * @returns null when no point lies in the window
 * @see docs/methods.md, uncertainty
 */
export function windowMean(
  curve: ReducedCurve,
  [low, high]: readonly [number | null, number | null],
): WindowMean | null {
  const { ensemble, reference } = curve
  const grid = ensemble?.abscissa ?? curve.abscissa
  const inside = [...grid.keys()].filter(
    (k) => k !== reference && (low === null || grid[k]! >= low) && (high === null || grid[k]! <= high),
  )
  if (inside.length === 0) return null
  const window = [grid[inside[0]!]!, grid[inside.at(-1)!]!] as const
  const facts = { window, points: inside.length }
  if (!ensemble) return { ...facts, ...givenMean(curve, inside), change: null }
  const half = Math.floor(inside.length / 2)
  const mean = ensembleStatistic(ensemble, reference, (row) => averageAt(row, inside))
  const change =
    half > 0 && mean.standardError !== null
      ? ensembleStatistic(
          ensemble,
          reference,
          (row) => averageAt(row, inside.slice(-half)) - averageAt(row, inside.slice(0, half)),
        )
      : null
  return {
    ...facts,
    ...mean,
    change: change?.standardError ? { value: change.value, standardError: change.standardError } : null,
  }
}

const averageAt = (row: Float64Array, at: readonly number[]) =>
  at.reduce((sum, k) => sum + row[k]!, 0) / at.length

/** Mean over trajectories of a number that each yields, divided by the mean at the reference time; jackknife error. */
function ensembleStatistic(
  { values, abscissa, ids, weights }: Ensemble,
  reference: number | null,
  of: (row: Float64Array) => number,
): { readonly value: number; readonly standardError: number | null } {
  const rows = ids.map((_, i) => values.subarray(i * abscissa.length, (i + 1) * abscissa.length))
  const weight = ids.map((_, i) => weights?.[i] ?? 1)
  const above = rows.map((row, i) => weight[i]! * of(row))
  const below = rows.map((row, i) => weight[i]! * (reference === null ? 1 : row[reference]!))
  const total = (parts: readonly number[]) => parts.reduce((sum, part) => sum + part, 0)
  const [allAbove, allBelow] = [total(above), total(below)]
  const value = allAbove / allBelow
  if (ids.length < 2) return { value, standardError: null }
  const deletions = Float64Array.from(ids, (_, i) => (allAbove - above[i]!) / (allBelow - below[i]!))
  return { value, standardError: jackknife(value, deletions).standardError }
}

function givenMean({ mean, standardError }: ReducedCurve, inside: readonly number[]) {
  const weight = inside.map((k) => 1 / standardError[k]! ** 2)
  const sum = weight.reduce((a, b) => a + b, 0)
  const value = inside.reduce((total, k, j) => total + weight[j]! * mean[k]!, 0) / sum
  return { value, standardError: Math.sqrt(1 / sum) }
}
