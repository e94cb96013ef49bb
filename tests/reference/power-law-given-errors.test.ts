import { readFileSync } from "node:fs"
import { expect, test } from "vitest"
import { fitGivenErrors } from "@/lib/stats/power-law/fit-given-errors"
import { chiSquareCdf } from "@/lib/stats/distributions/chi-square-cdf"

// R's lm with weights 1/sigma_ln^2; relative 1e-10 as the file states.
const r = JSON.parse(readFileSync(new URL("./data/r/wls_loglog_bands.json", import.meta.url), "utf8"))

test("log–log weighted least squares with known errors, against R", () => {
  const { t, y, sigma } = r.data as Record<"t" | "y" | "sigma", number[]>
  const x = Float64Array.from(t, Math.log)
  const fit = fitGivenErrors(
    x,
    Float64Array.from(y, Math.log),
    Float64Array.from(sigma, (s, k) => (s / y[k]!) ** 2),
    "inverse-variance",
  )
  const known = r.sigmaKnown
  const atZero = -fit.centre
  const relative = (actual: number, expected: number) => Math.abs(actual / expected - 1)
  expect(relative(fit.slope, known.coef[1])).toBeLessThan(1e-10)
  expect(relative(fit.level + fit.slope * atZero, known.coef[0])).toBeLessThan(1e-10)
  expect(relative(fit.slopeError, known.se[1])).toBeLessThan(1e-10)
  const interceptError = Math.sqrt(
    fit.levelError ** 2 + 2 * atZero * fit.covariance + (atZero * fit.slopeError) ** 2,
  )
  expect(relative(interceptError, known.se[0])).toBeLessThan(1e-10)
  expect(relative(fit.chiSquare, known.chi2)).toBeLessThan(1e-10)
  expect(fit.degreesOfFreedom).toBe(known.df)
  expect(1 - chiSquareCdf(fit.chiSquare, fit.degreesOfFreedom)).toBeCloseTo(known.pValue, 12)
})
