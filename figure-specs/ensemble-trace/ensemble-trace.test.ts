import { expect, test } from "vitest"
import { simulateCornerGrowth } from "../../scripts/simulate/corner-growth"
import type { DataTable } from "../figure-kind"
import { longTable } from "@tests/support/long-table"
import { computeTrace } from "./compute"
import { ensembleTraceParams } from "./params"

const compute = (table: DataTable, panel: object) =>
  computeTrace(
    { tables: new Map([["d", table]]) },
    ensembleTraceParams.parse({
      kind: "ensemble-trace",
      data: { dataset: "d", columns: { trajectory: "run", time: "t", observable: "y" } },
      ...panel,
    }),
  )

test("the width of a finite ring saturates at (L + 1)/12, within its own interval", () => {
  // Steps +1 and -1 in uniformly random order on a closed path (arithmetic); see scripts/simulate/corner-growth.ts.
  const times = Array.from({ length: 40 }, (_, k) => 25 * (k + 1))
  const widths = simulateCornerGrowth({ sites: 48, trajectories: 150, times, seed: 21 })
  const table = longTable(
    ["run", "t", "y"],
    widths.flatMap((row, run) => times.map((t, k) => [run, t, row[k]!])),
  )
  const result = compute(table, { saturation: { window: [500, null] } })
  const [value] = result.curves[0]!.quantities
  expect(value!.interval!.low).toBeLessThan(49 / 12)
  expect(value!.interval!.high).toBeGreaterThan(49 / 12)
  expect(value!.standardError! / value!.value).toBeLessThan(0.04)
  expect(result.warnings.map(({ code }) => code)).not.toContain("NOT_SATURATED")
})

// Three trajectories at two times, and their window averages 2, 3, 7 (arithmetic).
const small = longTable(
  ["run", "t", "y"],
  [
    [1, 1, 1],
    [1, 2, 3],
    [2, 1, 2],
    [2, 2, 4],
    [3, 1, 6],
    [3, 2, 8],
    [4, 1, 0],
    [4, 2, 2],
    [5, 1, 1],
    [5, 2, 3],
  ],
)

test("the saturation value is the mean of each trajectory's average, its error that of whole trajectories", () => {
  const [quantity] = compute(small, { saturation: {} }).curves[0]!.quantities
  // Averages 2, 3, 7, 1, 2: mean 3, sample variance (1 + 0 + 16 + 4 + 1)/4 = 5.5, error sqrt(5.5/5).
  expect(quantity!.value).toBeCloseTo(3, 14)
  expect(quantity!.standardError).toBeCloseTo(Math.sqrt(5.5 / 5), 14)
  // R: qt(0.975, 4) = 2.776445.
  expect(quantity!.interval!.high - 3).toBeCloseTo(2.776445 * Math.sqrt(5.5 / 5), 5)
})

test("what still changes is told", () => {
  // Every trajectory rises by 2 between the halves: the change has no error at all, so a little is added.
  const noisy = {
    ...small,
    columns: small.columns.map((column) =>
      column.name === "y"
        ? { ...column, values: (column.values as Float64Array).map((y, k) => y + (k % 3) / 10) }
        : column,
    ),
  }
  const codes = compute(noisy, { saturation: {} }).warnings.map(({ code }) => code)
  expect(codes).toContain("NOT_SATURATED")
})

test("the band is Student's t around the mean, and absent for a single trajectory", () => {
  const [curve] = compute(small, {}).curves
  // Values at t = 1: 1, 2, 6, 0, 1; mean 2, variance (1 + 0 + 16 + 4 + 1)/4 = 5.5.
  expect(curve!.bandHigh![0]).toBeCloseTo(2 + 2.776445 * Math.sqrt(5.5 / 5), 5)
  const one = compute(small, {
    data: {
      dataset: "d",
      columns: { trajectory: "run", time: "t", observable: "y" },
      where: [{ column: "run", equals: 3 }],
    },
  })
  expect(one.curves[0]!.bandLow).toBeNull()
  expect(one.warnings.map(({ code }) => code)).toContain("SINGLE_TRAJECTORY")
})

test("given errors are weighted by their inverse variance", () => {
  const given = longTable(
    ["t", "y", "s"],
    [
      [1, 2, 1],
      [2, 4, 2],
    ],
  )
  const [quantity] = compute(given, {
    data: { dataset: "d", columns: { time: "t", observable: "y", uncertainty: "s" } },
    saturation: {},
  }).curves[0]!.quantities
  // Weights 1 and 1/4: (2 + 1)/1.25 and 1/sqrt(1.25) (arithmetic).
  expect(quantity!.value).toBeCloseTo(2.4, 14)
  expect(quantity!.standardError).toBeCloseTo(1 / Math.sqrt(1.25), 14)
})
