import type { DataTable } from "../../figure-specs/figure-kind"
import { simulateCornerGrowth } from "./corner-growth"
import { simulateExclusionFront } from "./exclusion-front"
import { logTimes } from "./log-times"
import { simulateAnnihilation } from "./pair-annihilation"

/** A long table as a simulation writes it: one row a measurement. */
export interface SimulatedTable {
  readonly columns: readonly {
    readonly name: string
    readonly unit: string | null
    readonly values: Float64Array
  }[]
  readonly rows: number
}

function tableOf(
  headers: readonly (readonly [name: string, unit: string | null])[],
  rows: readonly (readonly number[])[],
): SimulatedTable {
  return {
    rows: rows.length,
    columns: headers.map(([name, unit], c) => ({
      name,
      unit,
      values: Float64Array.from(rows, (row) => row[c]!),
    })),
  }
}

/** Pair annihilation from the full ring of 2 000 sites, 400 trajectories for each of three hop rates gamma. */
function annihilation(): SimulatedTable {
  const times = [0, ...logTimes(0.1, 2000, 24)]
  const rows = [0.5, 1, 2].flatMap((rate, index) =>
    simulateAnnihilation({ sites: 2000, trajectories: 400, rate, times, seed: 1861 + index }).flatMap(
      (density, run) => times.map((t, k) => [400 * index + run + 1, rate, t, density[k]!]),
    ),
  )
  return tableOf(
    [
      ["run", null],
      ["gamma", "J"],
      ["t", "1/J"],
      ["n", null],
    ],
    rows,
  )
}

/** Ring sizes of the growth table and how many trajectories each has; the largest averages over itself. */
const growthSizes = [
  [64, 120],
  [128, 120],
  [256, 120],
  [512, 120],
  [2048, 64],
] as const

/** Squared width of the corner growth model from flat starts, for five ring sizes L. */
function growth(): SimulatedTable {
  const times = logTimes(1, 1000, 16)
  const rows = growthSizes.flatMap(([sites, trajectories], index) =>
    simulateCornerGrowth({ sites, trajectories, times, seed: 1986 + index }).flatMap((widths, run) =>
      times.map((t, k) => [1000 * index + run + 1, sites, t, Number(widths[k]!.toPrecision(8))]),
    ),
  )
  return tableOf(
    [
      ["run", null],
      ["L", null],
      ["t", "1/J"],
      ["w2", null],
    ],
    rows,
  )
}

/** Density of the exclusion process from the step, in cells of 8 sites, 100 trajectories. */
function front(): SimulatedTable {
  const cell = 8
  const times = Array.from({ length: 41 }, (_, k) => 20 * k)
  const cells = Array.from({ length: 61 }, (_, k) => -80 + cell * k)
  const rows = simulateExclusionFront({ trajectories: 100, times, cells, cell, seed: 1981 }).flatMap(
    (density, run) =>
      times.flatMap((t, k) =>
        cells.map((left, c) => [run + 1, t, left + (cell - 1) / 2, density[k * cells.length + c]!]),
      ),
  )
  return tableOf(
    [
      ["run", null],
      ["t", "1/J"],
      ["x", null],
      ["rho", null],
    ],
    rows,
  )
}

/** The tables of the demo, each from its fixed seed; a few seconds each. */
export const simulatedTables = { annihilation, growth, front } as const satisfies Record<
  string,
  () => SimulatedTable
>

export type SimulationName = keyof typeof simulatedTables

/** Comma-separated values with headers such as `t [1/J]`. */
export function tableCsv({ columns, rows }: SimulatedTable): string {
  const lines = [columns.map(({ name, unit }) => (unit === null ? name : `${name} [${unit}]`)).join(",")]
  for (let row = 0; row < rows; row += 1) lines.push(columns.map(({ values }) => values[row]!).join(","))
  return `${lines.join("\n")}\n`
}

/** The table as figures see it. */
export const asDataTable = ({ columns, rows }: SimulatedTable): DataTable => ({
  rows,
  columns: columns.map((column) => ({ ...column, symbol: null })),
})
