import { expect, test } from "vitest"
import { longTable } from "@tests/support/long-table"
import { simulateMeetingTimes } from "../../scripts/simulate/meeting-times"
import type { DataTable } from "../figure-kind"
import { SpecError } from "../spec-error"
import { computeTimes } from "./compute"
import { characteristicTimeParams } from "./params"
import { timeSentence } from "./sentence"

const paramsOf = (panel: object) =>
  characteristicTimeParams.parse({
    kind: "characteristic-time",
    data: { dataset: "d", columns: { trajectory: "run", parameter: "u", observable: "tau" } },
    ...panel,
  })
const compute = (table: DataTable, panel: object = {}) =>
  computeTimes({ tables: new Map([["d", table]]) }, paramsOf(panel))

test("walkers on a ring meet after a time that grows as L^2, within its own interval", () => {
  // L^2/(8 G) exactly: see scripts/simulate/meeting-times.ts.
  const table = longTable(
    ["run", "u", "tau"],
    [8, 12, 16, 24, 32, 48].flatMap((sites, k) =>
      Array.from(simulateMeetingTimes(sites, 1, 600, 41 + k), (time, run) => [run, sites, time]),
    ),
  )
  const result = compute(table)
  const [exponent, amplitude] = result.curves[0]!.quantities
  expect(exponent!.name).toBe("exponent")
  expect(exponent!.interval!.low).toBeLessThan(2)
  expect(exponent!.interval!.high).toBeGreaterThan(2)
  expect(amplitude!.interval!.low).toBeLessThan(1 / 8)
  expect(amplitude!.interval!.high).toBeGreaterThan(1 / 8)
  expect(result.curves[0]!.verdict).toBe("strongly favoured")
  expect(timeSentence(paramsOf({}), result).plain).toContain(
    "power law strongly favoured over exponential law",
  )
})

const sizes = [1, 2, 3, 5, 8, 13]
const given = (law: (u: number) => number) =>
  longTable(
    ["u", "tau", "s"],
    sizes.map((u, k) => [u, law(u) * (1 + (k % 2 ? 0.01 : -0.01)), 0.02 * law(u)]),
  )
const columns = { parameter: "u", observable: "tau", uncertainty: "s" }

test("an exponential law is told from a power law, and the one asked for is shown", () => {
  const table = given((u) => 2 * Math.exp(0.5 * u))
  const data = { dataset: "d", columns }
  const best = compute(table, { data }).curves[0]!
  expect(best.laws.map(({ law }) => law)).toEqual(["exponential", "power"])
  expect(best.quantities[0]!.name).toBe("rate")
  expect(Math.abs(best.quantities[0]!.value - 0.5)).toBeLessThan(2 * best.quantities[0]!.standardError!)
  const asked = compute(table, { data, fit: { shown: "power" } }).curves[0]!
  expect(asked.laws.map(({ law }) => law)).toEqual(["power", "exponential"])
})

test("too few values rank nothing, and the warning says so", () => {
  const data = { dataset: "d", columns, where: [{ column: "u", range: [2, null] }] }
  const result = compute(
    given((u) => u ** 1.5),
    { data },
  )
  expect(result.curves[0]!.verdict).toBe("unsafe")
  expect(result.warnings.map(({ code }) => code)).toContain("MODEL_RANK_UNSAFE")
})

test("several times a value need a column of trajectories", () => {
  const table = longTable(
    ["u", "tau"],
    [
      [1, 2],
      [1, 3],
      [2, 5],
    ],
  )
  const act = () => compute(table, { data: { dataset: "d", columns: { parameter: "u", observable: "tau" } } })
  expect(act).toThrow(SpecError)
  expect(act).toThrow(/2 rows at 1/)
})
