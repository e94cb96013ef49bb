import { expect, test } from "vitest"
import { simulateMerging } from "../../scripts/simulate/merging-clusters"
import { longTable } from "@tests/support/long-table"
import type { DataTable } from "../figure-kind"
import { finiteTimeDivergence } from "."
import { finiteTimeDivergenceParams } from "./params"

const compute = (table: DataTable, panel: object = {}) =>
  finiteTimeDivergence.compute(
    { tables: new Map([["d", table]]) },
    finiteTimeDivergenceParams.parse({
      kind: "finite-time-divergence",
      data: { dataset: "d", columns: { trajectory: "run", time: "t", observable: "y" } },
      ...panel,
    }),
  )

test("merging clusters diverge at t* = 1 with exponent 1, within their own intervals", () => {
  // Erdős & Rényi, Publ. Math. Inst. Hung. Acad. Sci. 5, 17 (1960); see scripts/simulate/merging-clusters.ts.
  const times = Array.from({ length: 46 }, (_, k) => 0.02 * k)
  const sizes = simulateMerging({ particles: 100_000, trajectories: 30, times, seed: 31 })
  const table = longTable(
    ["run", "t", "y"],
    sizes.flatMap((row, run) => times.map((t, k) => [run, t, row[k]!])),
  )
  const result = compute(table, { fit: { interval: { resamples: 400 } } })
  const [singularTime, exponent] = result.curves[0]!.quantities
  for (const quantity of [singularTime!, exponent!]) {
    expect(quantity.interval!.type).toBe("expanded-percentile")
    expect(quantity.interval!.low).toBeLessThan(1)
    expect(quantity.interval!.high).toBeGreaterThan(1)
    expect(quantity.standardError!).toBeLessThan(0.02)
  }
})

const exact = longTable(
  ["run", "t", "y"],
  [1, 2, 3, 4, 5, 6].flatMap((run) =>
    Array.from({ length: 30 }, (_, k) => k / 10).map((t) => [
      run,
      t,
      (1 + 0.01 * run) * 2 * (3.2 - t) ** -0.7,
    ]),
  ),
)

test("an exact divergence is recovered (arithmetic)", () => {
  const quantities = compute(exact).curves[0]!.quantities
  expect(quantities.map(({ name }) => name)).toEqual(["singularTime", "divergenceExponent", "amplitude"])
  expect(quantities[0]!.value).toBeCloseTo(3.2, 6)
  expect(quantities[1]!.value).toBeCloseTo(0.7, 6)
  expect(quantities[2]!.value).toBeCloseTo(2 * 1.035, 5)
})

test("the law is drawn beyond its window, dashed, towards t*, and never past it", () => {
  const { fit } = compute(exact, { fit: { window: [1, 2.5] } }).curves[0]!
  expect(fit!.grid.at(-1)!).toBeLessThan(3.2)
  expect(fit!.grid.at(-1)!).toBeGreaterThan(2.9)
  fit!.grid.forEach((t, k) => expect(fit!.outside[k]).toBe(t < 1 || t > 2.5))
})

test("what does not diverge has no value for t*, only a warning", () => {
  const flat = longTable(
    ["run", "t", "y"],
    [1, 2, 3, 4, 5, 6].flatMap((run) =>
      Array.from({ length: 20 }, (_, k) => [run, k, Math.exp(0.05 * k) * (1 + 0.01 * run)]),
    ),
  )
  const result = compute(flat)
  expect(result.warnings.map(({ code }) => code)).toContain("BOUNDARY_SOLUTION")
  expect(result.curves[0]!.quantities.every(({ interval }) => interval === null)).toBe(true)
})
