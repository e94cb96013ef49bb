import { readFileSync } from "node:fs"
import { afterAll, expect, test } from "vitest"
import { curveProblem } from "@/lib/stats/nonlinear/curve-problem"
import { levenbergMarquardt } from "@/lib/stats/nonlinear/levenberg-marquardt"
import { normalCovariance } from "@/lib/stats/nonlinear/normal-covariance"
import { nistModels } from "./nist-models"

/** Least digits of agreement; the goals are 9 for the lower and average sets and 6 for the higher ones. */
const levels = {
  Misra1a: { difficulty: "lower", parameters: 9, errors: 9 },
  DanWood: { difficulty: "lower", parameters: 9, errors: 9 },
  Lanczos3: { difficulty: "lower", parameters: 9, errors: 9 },
  Hahn1: { difficulty: "average", parameters: 9, errors: 9 },
  MGH09: { difficulty: "higher", parameters: 9, errors: 9 },
} as const

const read = (file: string) => readFileSync(new URL(`./data/nist/${file}`, import.meta.url), "utf8")
/** Common leading digits, at most 15. @see McCullough, Am. Stat. 52, 358 (1998), the log relative error */
const digits = (value: number, certified: number) =>
  Math.min(15, -Math.log10(Math.max(1e-15, Math.abs(value / certified - 1))))
const worst = (values: ArrayLike<number>, certified: readonly string[]) =>
  Math.min(...certified.map((text, k) => digits(values[k]!, Number(text))))

const table: string[] = []
afterAll(() =>
  console.log(
    [
      "Digits of agreement with NIST StRD (nonlinear)",
      "set        level    start  parameters  errors  sum of squares",
      ...table,
    ].join("\n"),
  ),
)

for (const [name, level] of Object.entries(levels))
  for (const start of [1, 2] as const)
    test(`${name} from start ${start}`, () => {
      const reference = JSON.parse(read(`${name}.json`))
      // The certified 11 digits and the same values in 60-digit arithmetic (highPrecision); the file says how.
      const { params, se, rss } = reference.highPrecision as { params: string[]; se: string[]; rss: string }
      const rows = read(`${name}.csv`)
        .trim()
        .split("\n")
        .slice(1)
        .map((line) => line.split(",").map(Number))
      const n = rows.length
      const p = params.length
      const problem = curveProblem(
        nistModels[name]!,
        Float64Array.from(rows, (row) => row[0]!),
        Float64Array.from(rows, (row) => row[1]!),
        new Float64Array(n).fill(1),
      )
      const fit = levenbergMarquardt(problem, reference[`start${start}`])
      expect(fit.code).toBe("converged")
      const jacobian = new Float64Array(n * p)
      problem.jacobian(fit.parameters, jacobian)
      const scale = fit.sumOfSquares / (n - p)
      const covariance = normalCovariance(jacobian, n, p)
      const errors = Float64Array.from({ length: p }, (_, k) => Math.sqrt(scale * covariance[k * p + k]!))
      const found = [worst(fit.parameters, params), worst(errors, se), digits(fit.sumOfSquares, Number(rss))]
      table.push(
        `${name.padEnd(10)} ${level.difficulty.padEnd(8)} ${start}      ${found.map((d) => d.toFixed(1).padEnd(11)).join(" ")}`,
      )
      expect(found[0]).toBeGreaterThanOrEqual(level.parameters)
      expect(found[1]).toBeGreaterThanOrEqual(level.errors)
      expect(found[2]).toBeGreaterThanOrEqual(9)
    })
