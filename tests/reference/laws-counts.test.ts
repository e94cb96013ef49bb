import { readFileSync } from "node:fs"
import { expect, test } from "vitest"
import { garwoodInterval } from "@/lib/stats/counts/garwood-interval"
import { clopperPearsonInterval } from "@/lib/stats/counts/proportion-interval"

// R's qchisq and qbeta; relative 1e-10 as the file states.
const r = JSON.parse(readFileSync(new URL("./data/r/quantiles.json", import.meta.url), "utf8"))

const near = (actual: number, expected: number) =>
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(Math.max(1e-12, 1e-10 * Math.abs(expected)))

test.each([
  ["poissonExact95", 0.95],
  ["poissonExact68", 1 - 2 * 0.158655253931457],
] as const)("Garwood intervals, %s", (name, level) => {
  const table = r[name] as Record<"k" | "lower" | "upper", number[]>
  table.k.forEach((k, i) => {
    const [low, high] = garwoodInterval(k, level)
    near(low, table.lower[i]!)
    near(high, table.upper[i]!)
  })
})

test("Clopper–Pearson intervals of k out of 100", () => {
  const table = r.clopperPearson95 as { k: number[]; n: number; lower: number[]; upper: number[] }
  table.k.forEach((k, i) => {
    const [low, high] = clopperPearsonInterval(k, table.n, 0.95)
    near(low, table.lower[i]!)
    near(high, table.upper[i]!)
  })
})
