import { beforeAll, describe, expect, test } from "vitest"
import { computeFigure } from "../compute-figure"
import { figureSpec, type FigureSpecInput } from "../figure-spec"
import type { DataTable } from "../figure-kind"
import { longTable } from "@tests/support/long-table"
import { SpecError } from "../spec-error"
import { logTimes } from "../../scripts/simulate/log-times"
import { simulateAnnihilation } from "../../scripts/simulate/pair-annihilation"
import { decaySentence } from "./sentence"
import type { DecayExponentParams } from "./params"

const specOf = (panel: object): FigureSpecInput =>
  ({
    version: 1,
    panels: [
      {
        kind: "decay-exponent",
        data: { dataset: "ring", columns: { trajectory: "run", time: "t", observable: "n" } },
        ...panel,
      },
    ],
  }) as FigureSpecInput
const compute = (panel: object, table: DataTable) =>
  computeFigure(figureSpec.parse(specOf(panel)), { tables: new Map([["ring", table]]) }).panels[0]!
const issuesOf = (act: () => unknown) => {
  try {
    act()
  } catch (error) {
    if (error instanceof SpecError) return error.issues
    throw error
  }
  throw new Error("No SpecError was thrown.")
}

describe("pair annihilation on a ring", () => {
  let table: DataTable
  const times = [0, ...logTimes(0.1, 3000, 20)]
  beforeAll(() => {
    const densities = simulateAnnihilation({ sites: 2000, trajectories: 200, rate: 1, times, seed: 20261201 })
    table = longTable(
      ["run", "t", "n"],
      densities.flatMap((row, i) => times.map((t, k) => [i + 1, t, row[k]!])),
    )
  })

  test("the exponent agrees with the exact -1/2 within its own interval, amplitude with (4 pi G)^(-1/2)", () => {
    // Torney & McConnell, J. Phys. Chem. 87, 1941 (1983); Glauber, J. Math. Phys. 4, 294 (1963): n -> (4 pi G t)^(-1/2).
    const panel = compute({ fit: { window: [30, 3000], interval: { level: 0.95 } } }, table)
    const [exponent, amplitude] = panel.curves[0]!.quantities
    expect(exponent!.interval!.low).toBeLessThan(-0.5)
    expect(exponent!.interval!.high).toBeGreaterThan(-0.5)
    expect(amplitude!.interval!.low).toBeLessThan(1 / Math.sqrt(4 * Math.PI))
    expect(amplitude!.interval!.high).toBeGreaterThan(1 / Math.sqrt(4 * Math.PI))
    // The interval has to be worth something: 200 trajectories over two decades reach below one per cent of the exponent.
    expect(exponent!.standardError!).toBeLessThan(0.008)
  })

  test("resampled and deleted trajectories tell the same error", () => {
    const fit = { window: [30, 3000] }
    const jackknife = compute({ fit }, table).curves[0]!.quantities[0]!
    const bootstrap = compute(
      { fit: { ...fit, interval: { method: "expanded-percentile", resamples: 2000, seed: 7 } } },
      table,
    ).curves[0]!.quantities[0]!
    const width = (q: typeof jackknife) => q.interval!.high - q.interval!.low
    // Monte Carlo error of a 95 % end at B = 2000 is about 0.05 SE (docs/methods.md), so widths agree to about 5 %.
    expect(Math.abs(width(bootstrap) / width(jackknife) - 1)).toBeLessThan(0.15)
    expect(bootstrap.value).toBe(jackknife.value)
  })

  test("bins leave the exponent as it is; dividing by n(0) moves only the amplitude", () => {
    const fit = { window: [30, 3000] }
    const plain = compute({ fit }, table).curves[0]!.quantities[0]!
    const binned = compute({ fit, reduction: { bins: { perDecade: 8 } } }, table).curves[0]!.quantities[0]!
    expect(Math.abs(plain.value - binned.value)).toBeLessThan(plain.standardError!)
    const divided = compute({ fit, reduction: { normalise: "initial" } }, table).curves[0]!.quantities[0]!
    expect(divided.value).toBeCloseTo(plain.value, 10)
  })

  test("the same input gives the same bits", () => {
    const panel = { fit: { interval: { method: "bca" } } }
    expect(JSON.stringify(compute(panel, table))).toBe(JSON.stringify(compute(panel, table)))
  })

  test("the caption's sentence carries the numbers of the result", () => {
    const spec = figureSpec.parse(specOf({ fit: { window: [30, 3000] } }))
    const result = compute({ fit: { window: [30, 3000] } }, table)
    const { plain } = decaySentence(spec.panels[0] as DecayExponentParams, result as never)
    expect(plain).toContain("mean of 200 trajectories")
    expect(plain).toContain(result.curves[0]!.quantities[0]!.text.replace("-", "−"))
  })
})

describe("exact data", () => {
  const rows = [1, 2, 3, 4, 5, 6].flatMap((run) =>
    [1, 2, 4, 8, 16, 32, 64, 128].map((t) => [
      run,
      t,
      (1 + 0.01 * run) * 3 * t ** -0.75,
      run % 2 ? 0.1 : 0.2,
    ]),
  )
  const table = longTable(["run", "t", "n", "gamma"], rows)

  test("a pure power law is recovered to the last digits (arithmetic)", () => {
    const [exponent] = compute({ fit: {} }, table).curves[0]!.quantities
    expect(exponent!.value).toBeCloseTo(-0.75, 13)
    expect(exponent!.standardError).toBeLessThan(1e-13)
  })

  test("one curve per parameter, named quantities, filters", () => {
    const panel = compute(
      {
        data: {
          dataset: "ring",
          columns: { trajectory: "run", time: "t", observable: "n" },
          curveBy: "gamma",
          where: [{ column: "t", range: [2, null] }],
        },
        quantities: [{ name: "alphaWeak", of: "exponent", curve: 0.2 }],
      },
      table,
    )
    expect(panel.curves.map((curve) => curve.curve)).toEqual([0.1, 0.2])
    expect(panel.quantities.map((quantity) => quantity.name)).toEqual(["alphaWeak"])
    // Three trajectories a curve: a value, but no interval that deserves the name.
    expect(panel.quantities[0]!.interval).toBeNull()
  })

  test("values with given errors instead of trajectories", () => {
    const given = longTable(
      ["t", "n", "sigma"],
      [1, 2, 5, 10, 20, 50, 100, 200].map((t, k) => [
        t,
        [0.3072, 0.2041, 0.1263, 0.0881, 0.0636, 0.0396, 0.0285, 0.0197][k]!,
        [0.003, 0.002, 0.0015, 0.001, 0.001, 0.0008, 0.0006, 0.0006][k]!,
      ]),
    )
    const panel = compute(
      {
        data: { dataset: "ring", columns: { time: "t", observable: "n", uncertainty: "sigma" } },
        fit: { weights: "inverse-variance" },
      },
      given,
    )
    // R's lm with known errors: tests/reference/data/r/wls_loglog_bands.json, sigmaKnown.
    expect(panel.curves[0]!.quantities[0]!.value).toBeCloseTo(-0.5180795665024922, 12)
    expect(panel.curves[0]!.quantities[0]!.standardError).toBeCloseTo(0.003239368598096842, 12)
    expect(panel.warnings.map((warning) => warning.code)).toContain("SCATTER_EXCEEDS_ERRORS")
  })

  test("what does not fit is told at its place, all at once", () => {
    const bad = {
      data: {
        dataset: "ring",
        columns: { trajectory: "run", time: "tau", observable: "rho" },
        where: [{ column: "mass", equals: 1 }],
      },
    }
    expect(issuesOf(() => compute(bad, table)).map((issue) => issue.pointer)).toEqual([
      "/panels/0/data/columns/time",
      "/panels/0/data/columns/observable",
      "/panels/0/data/where/0/column",
    ])
    const mixed = { data: { dataset: "ring", columns: { time: "t", observable: "n" } } }
    expect(issuesOf(() => compute(mixed, table))[0]!.code).toBe("repeated-time")
  })

  test("unequal grids are refused and repaired only when asked", () => {
    const uneven = longTable(
      ["run", "t", "n"],
      rows.filter((row) => !(row[0] === 3 && row[1] === 8)).map((row) => row.slice(0, 3)),
    )
    expect(issuesOf(() => compute({}, uneven))[0]!.pointer).toBe("/panels/0/reduction/unequalGrids")
    const joined = compute({ reduction: { unequalGrids: "inner-join" } }, uneven)
    expect(joined.series[0]!.columns[0]!.values).toEqual([1, 2, 4, 16, 32, 64, 128])
  })
})
