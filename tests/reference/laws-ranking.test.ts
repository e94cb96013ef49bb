import { readFileSync } from "node:fs"
import { expect, test } from "vitest"
import { rankCharacteristicTimes } from "@/lib/stats/ranking/rank-characteristic-times"

// R, lm and logLik on ln tau; relative 1e-10 as the file states.
const r = JSON.parse(readFileSync(new URL("./data/r/aicc.json", import.meta.url), "utf8"))
const u = Float64Array.from(r.data.u as number[])
const tau = Float64Array.from(r.data.tau as number[])
const relative = (actual: number, expected: number) => Math.abs(actual / expected - 1)

test("ranking with estimated scale, against R", () => {
  const { laws, verdict } = rankCharacteristicTimes({ u, tau }, "tau", ["power", "exponential"])
  const expected = r.scaleEstimated
  expect(verdict).toBe("strongly favoured")
  // R keeps the constants of the Gaussian likelihood that are common to all models.
  const constants = u.length * (Math.log(2 * Math.PI) + 1)
  laws.forEach(({ law, aicc, weight, line }) => {
    const k = expected.models.indexOf(law)
    expect(relative(aicc + constants, expected.AICc[k])).toBeLessThan(1e-10)
    expect(relative(weight, expected.weights[k])).toBeLessThan(1e-10)
    expect(relative(line.slope, expected.slope[k])).toBeLessThan(1e-10)
    expect(relative(line.slopeError, expected.slopeSE[k])).toBeLessThan(1e-10)
  })
})

test("ranking with known errors, against R", () => {
  const sigma = tau.map((value) => r.data.relativeSigma * value)
  const { laws } = rankCharacteristicTimes({ u, tau, sigma }, "tau", ["power", "exponential"])
  laws.forEach(({ law, aicc, line }) => {
    expect(relative(aicc, r.sigmaKnown[law].AICc)).toBeLessThan(1e-10)
    expect(relative(line.chiSquare, r.sigmaKnown[law].chi2)).toBeLessThan(1e-10)
  })
})
