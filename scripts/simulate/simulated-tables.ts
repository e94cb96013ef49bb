import type { DataTable } from "../../figure-specs/figure-kind"
import { simulateMomenta } from "./bath-momenta"
import { simulateCornerGrowth } from "./corner-growth"
import { simulateExclusionFront } from "./exclusion-front"
import { logTimes } from "./log-times"
import { simulateMeetingTimes } from "./meeting-times"
import { simulateMerging } from "./merging-clusters"
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

/** A table from headers such as `t [1/J]`. */
function tableOf(headers: readonly string[], rows: readonly (readonly number[])[]): SimulatedTable {
  return {
    rows: rows.length,
    columns: headers.map((header, c) => {
      const [, name = header, unit = null] = /^(.+) \[(.+)\]$/.exec(header) ?? []
      return { name, unit, values: Float64Array.from(rows, (row) => row[c]!) }
    }),
  }
}

/** How many trajectories a share of all comes to; a test that needs a table but not its precision takes a few. */
const some = (all: number, share: number) => Math.max(12, Math.round(all * share))

/** Pair annihilation from the full ring of 2 000 sites, 400 trajectories for each of three hop rates gamma. */
function annihilation(share = 1): SimulatedTable {
  const trajectories = some(400, share)
  const times = [0, ...logTimes(0.1, 2000, 24)]
  const rows = [0.5, 1, 2].flatMap((rate, index) =>
    simulateAnnihilation({ sites: 2000, trajectories, rate, times, seed: 1861 + index }).flatMap(
      (density, run) => times.map((t, k) => [400 * index + run + 1, rate, t, density[k]!]),
    ),
  )
  return tableOf(["run", "gamma [J]", "t [1/J]", "n"], rows)
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
function growth(share = 1): SimulatedTable {
  const times = logTimes(1, 1000, 16)
  const rows = growthSizes.flatMap(([sites, all], index) =>
    simulateCornerGrowth({ sites, trajectories: some(all, share), times, seed: 1986 + index }).flatMap(
      (widths, run) =>
        times.map((t, k) => [1000 * index + run + 1, sites, t, Number(widths[k]!.toPrecision(8))]),
    ),
  )
  return tableOf(["run", "L", "t [1/J]", "w2"], rows)
}

/** Density of the exclusion process from the step, in cells of 8 sites, 100 trajectories. */
function front(share = 1): SimulatedTable {
  const cell = 8
  const times = Array.from({ length: 41 }, (_, k) => 20 * k)
  const cells = Array.from({ length: 61 }, (_, k) => -80 + cell * k)
  const trajectories = some(100, share)
  const rows = simulateExclusionFront({ trajectories, times, cells, cell, seed: 1981 }).flatMap(
    (density, run) =>
      times.flatMap((t, k) =>
        cells.map((left, c) => [run + 1, t, left + (cell - 1) / 2, density[k * cells.length + c]!]),
      ),
  )
  return tableOf(["run", "t [1/J]", "x", "rho"], rows)
}

/** Times at which two walkers meet, 400 trajectories for each of six ring sizes L, hop rate J. */
function meeting(share = 1): SimulatedTable {
  const rows = [8, 16, 32, 64, 128, 256].flatMap((sites, index) =>
    Array.from(simulateMeetingTimes(sites, 1, some(400, share), 1950 + index), (time, run) => [
      1000 * index + run + 1,
      sites,
      Number(time.toPrecision(8)),
    ]),
  )
  return tableOf(["run", "L", "tau_m [1/J]"], rows)
}

/** Mean size of merging clusters of 400 000 particles on the way to their divergence, 40 trajectories. */
function merging(share = 1): SimulatedTable {
  const times = Array.from({ length: 47 }, (_, k) => Number((0.02 * k).toFixed(2)))
  const rows = simulateMerging({
    particles: 400_000,
    trajectories: some(40, share),
    times,
    seed: 1960,
  }).flatMap((sizes, run) => times.map((t, k) => [run + 1, t, sizes[k]!]))
  return tableOf(["run", "t [1/J]", "S"], rows)
}

/** Momenta after a quench into a hotter bath, 400 particles in each of 60 trajectories, in 40 bins. */
function momenta(share = 1): SimulatedTable {
  const times = [0, 0.25, 0.5, 1, 2, 4]
  const edges = Array.from({ length: 42 }, (_, k) => -5.125 + 0.25 * k)
  const bins = edges.length - 1
  const rows = simulateMomenta({
    particles: 400,
    trajectories: some(60, share),
    times,
    cold: 0.1,
    hot: 1,
    edges,
    seed: 1930,
  }).flatMap((counts, run) =>
    times.flatMap((t, k) =>
      Array.from({ length: bins }, (_, b) => [run + 1, t, edges[b]! + 0.125, counts[k * bins + b]!]),
    ),
  )
  return tableOf(["run", "t [1/J]", "k", "n_k"], rows)
}

/** The tables of the demo and of the examples, each from its fixed seed; a few seconds each. */
export const simulatedTables = {
  annihilation,
  growth,
  front,
  meeting,
  merging,
  momenta,
} as const satisfies Record<string, (share?: number) => SimulatedTable>

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
