import type { StatisticalWarning } from "@/lib/stats/warnings/statistical-warning"
import { warn } from "@/lib/stats/warnings/warning-catalogue"
import { bindColumns, numbersOf, type BoundData, type CurveRows } from "../bind-columns"
import { describeCurve } from "../curve-words"
import type { CurveKey, PanelInput } from "../figure-kind"
import { SpecError } from "../spec-error"
import type { CharacteristicTimeParams } from "./params"

/** A characteristic time at each value of the control parameter. */
export interface ReducedTimes {
  readonly curve: CurveKey
  readonly where: string
  readonly u: Float64Array
  readonly tau: Float64Array
  /** Standard errors; null when there are none. */
  readonly sigma: Float64Array | null
  /** Trajectories behind each time; zeros for given values. */
  readonly counts: Int32Array
  readonly origin: "trajectories" | "given-errors" | "no-errors"
  readonly warnings: readonly StatisticalWarning[]
}

/** Coverage of a nominal 95 % interval was measured below this many trajectories; docs/methods.md. */
const fewTrajectories = 20

/**
 * From one row a trajectory and value of the control parameter to a mean time with its standard error at each value; a
 * table without trajectories gives one time a value, with its error if it has one.
 *
 * @throws SpecError with pointers relative to the panel
 */
export function reduceTimes(
  input: PanelInput,
  { data }: CharacteristicTimeParams,
): { readonly bound: BoundData; readonly curves: readonly ReducedTimes[] } {
  const bound = bindColumns(input, data, {
    trajectory: false,
    parameter: true,
    observable: true,
    uncertainty: false,
  })
  return { bound, curves: bound.curves.map((rows) => reduceCurve(bound, rows, data.curveBy)) }
}

function reduceCurve(
  { columns }: BoundData,
  { curve, rows }: CurveRows,
  curveBy: string | null,
): ReducedTimes {
  const where = describeCurve(curveBy, curve)
  const u = numbersOf(columns.get("parameter")!)
  const tau = numbersOf(columns.get("observable")!)
  const groups = new Map<number, number[]>()
  for (const row of rows) {
    if (Number.isNaN(u[row]!) || Number.isNaN(tau[row]!)) continue
    const group = groups.get(u[row]!)
    if (group) group.push(row)
    else groups.set(u[row]!, [row])
  }
  const values = [...groups.keys()].sort((a, b) => a - b)
  const grouped = values.map((value) => groups.get(value)!)
  const trajectory = columns.get("trajectory")
  const uncertainty = columns.get("uncertainty")
  const base = { curve, where, u: Float64Array.from(values) }
  if (trajectory) {
    grouped.forEach((group, k) =>
      refuseRepeats(
        group.map((row) => trajectory.values[row]!),
        values[k]!,
        where,
      ),
    )
    return { ...base, ...averaged(grouped, tau, where) }
  }
  const crowded = grouped.findIndex((group) => group.length > 1)
  if (crowded >= 0)
    throw new SpecError([
      {
        pointer: "/data/columns/trajectory",
        code: "repeated-parameter",
        message:
          `There are ${grouped[crowded]!.length} rows at ${values[crowded]}: name the column that numbers the ` +
          "trajectories, or filter by the parameters that tell them apart.",
      },
    ])
  const sigma = uncertainty ? Float64Array.from(grouped, ([row]) => numbersOf(uncertainty)[row!]!) : null
  return {
    ...base,
    tau: Float64Array.from(grouped, ([row]) => tau[row!]!),
    sigma,
    counts: new Int32Array(values.length),
    origin: sigma ? "given-errors" : "no-errors",
    warnings: [],
  }
}

function refuseRepeats(ids: readonly (number | string)[], value: number, where: string): void {
  if (new Set(ids).size === ids.length) return
  throw new SpecError([
    {
      pointer: "/data",
      code: "repeated-trajectory",
      message: `A trajectory of ${where} has two times at ${value}: filter by the parameters that tell them apart.`,
    },
  ])
}

function averaged(grouped: readonly (readonly number[])[], tau: Float64Array, where: string) {
  const means = grouped.map((group) => group.reduce((sum, row) => sum + tau[row]!, 0) / group.length)
  const sigma = Float64Array.from(grouped, (group, k) => {
    const squares = group.reduce((sum, row) => sum + (tau[row]! - means[k]!) ** 2, 0)
    return Math.sqrt(squares / (group.length - 1) / group.length)
  })
  const counts = Int32Array.from(grouped, (group) => group.length)
  const fewest = Math.min(...counts)
  const known = sigma.every((error) => error > 0)
  return {
    tau: Float64Array.from(means),
    sigma: known ? sigma : null,
    counts,
    origin: known ? ("trajectories" as const) : ("no-errors" as const),
    warnings:
      fewest < fewTrajectories
        ? [
            fewest === 1
              ? warn("SINGLE_TRAJECTORY", where)
              : warn("FEW_TRAJECTORIES", where, { trajectories: fewest, coverage: 91 }),
          ]
        : [],
  }
}
