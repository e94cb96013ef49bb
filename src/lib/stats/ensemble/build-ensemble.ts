import type { Ensemble } from "./ensemble"

/** A long table of one curve: one row a measurement. All arrays have the same length. */
export interface LongTable {
  readonly trajectory: ArrayLike<number | string>
  readonly abscissa: ArrayLike<number>
  readonly observable: ArrayLike<number>
  readonly weight?: ArrayLike<number>
}

/** What stands against averaging, with the trajectories it concerns. */
export class EnsembleError extends Error {
  constructor(
    readonly code: "UNEQUAL_GRIDS" | "REPEATED_TIME" | "NO_ROWS" | "BAD_WEIGHT" | "NOTHING_IN_COMMON",
    message: string,
  ) {
    super(message)
    this.name = "EnsembleError"
  }
}

/** Relative difference up to which two times count as the same. @see docs/methods.md, unequal grids */
export const timeTolerance = 1e-9

const sameTime = (a: number, b: number) =>
  a === b || Math.abs(a - b) <= timeTolerance * Math.max(Math.abs(a), Math.abs(b))

interface Trajectory {
  readonly id: string
  readonly times: Float64Array
  readonly values: Float64Array
  readonly weight: number
}

/** Rows of one table by trajectory, each sorted by time. */
export function splitTrajectories(table: LongTable): Trajectory[] {
  const rows = new Map<string, number[]>()
  for (let row = 0; row < table.abscissa.length; row += 1) {
    if (Number.isNaN(table.abscissa[row]!)) continue
    const id = String(table.trajectory[row])
    const own = rows.get(id)
    if (own) own.push(row)
    else rows.set(id, [row])
  }
  if (rows.size === 0) throw new EnsembleError("NO_ROWS", "No row is left after the filters; loosen them.")
  return [...rows].map(([id, own]) => {
    const isSorted = own.every((row, k) => k === 0 || table.abscissa[own[k - 1]!]! <= table.abscissa[row]!)
    if (!isSorted) own.sort((a, b) => table.abscissa[a]! - table.abscissa[b]!)
    const times = Float64Array.from(own, (row) => table.abscissa[row]!)
    const repeated = times.findIndex((t, k) => k > 0 && sameTime(t, times[k - 1]!))
    if (repeated > 0)
      throw new EnsembleError(
        "REPEATED_TIME",
        `Trajectory ${id} has two rows at ${times[repeated]}: filter by the parameters that tell them apart.`,
      )
    return {
      id,
      times,
      values: Float64Array.from(own, (row) => table.observable[row]!),
      weight: weightOf(table, own, id),
    }
  })
}

function weightOf(table: LongTable, rows: readonly number[], id: string): number {
  if (!table.weight) return 1
  const weight = table.weight[rows[0]!]!
  const changes = rows.some((row) => table.weight![row] !== weight)
  if (!(weight > 0) || !Number.isFinite(weight) || changes)
    throw new EnsembleError(
      "BAD_WEIGHT",
      `The weight of trajectory ${id} has to be one positive number for all its rows.`,
    )
  return weight
}

export type GridRepair = "refuse" | "inner-join"

/**
 * Puts the rows of one curve onto a common grid.
 *
 * Trajectories sampled at different times are refused unless the caller names the repair: `inner-join` keeps the times
 * that all trajectories have. Values are never interpolated here.
 *
 * @param table long table, abscissa and observable in the units of their columns
 * @throws EnsembleError UNEQUAL_GRIDS, REPEATED_TIME, NO_ROWS, BAD_WEIGHT, NOTHING_IN_COMMON
 * @see docs/methods.md, unequal grids
 */
export function buildEnsemble(table: LongTable, repair: GridRepair = "refuse"): Ensemble {
  const trajectories = splitTrajectories(table)
  const [first, ...others] = trajectories as [Trajectory, ...Trajectory[]]
  const equal = others.every(
    ({ times }) => times.length === first.times.length && times.every((t, k) => sameTime(t, first.times[k]!)),
  )
  if (!equal && repair === "refuse") {
    const odd = others.find(({ times }) => times.length !== first.times.length) ?? others[0]!
    throw new EnsembleError(
      "UNEQUAL_GRIDS",
      `Trajectories are sampled at different times (${first.id} has ${first.times.length} times, ${odd.id} has ` +
        `${odd.times.length}). Choose the times that all share, or interpolation, or bins.`,
    )
  }
  const abscissa = equal ? first.times : commonTimes(trajectories)
  if (abscissa.length === 0)
    throw new EnsembleError(
      "NOTHING_IN_COMMON",
      "No time is present in all trajectories; choose interpolation or bins.",
    )
  const values = new Float64Array(trajectories.length * abscissa.length)
  trajectories.forEach((trajectory, i) => {
    let from = 0
    for (let k = 0; k < abscissa.length; k += 1) {
      while (!sameTime(trajectory.times[from]!, abscissa[k]!)) from += 1
      values[i * abscissa.length + k] = trajectory.values[from]!
    }
  })
  const ids = trajectories.map(({ id }) => id)
  return table.weight
    ? { abscissa, values, ids, weights: Float64Array.from(trajectories, ({ weight }) => weight) }
    : { abscissa, values, ids }
}

function commonTimes(trajectories: readonly Trajectory[]): Float64Array {
  let common = trajectories[0]!.times
  for (const { times } of trajectories.slice(1)) {
    let from = 0
    common = common.filter((t) => {
      while (from < times.length && times[from]! < t && !sameTime(times[from]!, t)) from += 1
      return from < times.length && sameTime(times[from]!, t)
    })
  }
  return common
}
