import { describe, expect, test } from "vitest"
import { normalQuantile } from "../distributions/normal-quantile"
import { randomStream } from "../random/random-stream"
import { autocorrelationTime } from "./autocorrelation-time"
import { blocking } from "./blocking"
import { stationaryMean } from "./stationary-mean"

/** x_k = phi x_(k-1) + noise, stationary from the start; its exact tau is (1 + phi)/(1 - phi)/2. */
function autoregressive(phi: number, length: number, seed: number, drift = 0): Float64Array {
  const stream = randomStream(seed, 0)
  const normal = () => normalQuantile((stream.uint32() + 0.5) / 4294967296)
  const values = new Float64Array(length)
  let x = normal() / Math.sqrt(1 - phi * phi)
  for (let k = 0; k < length; k += 1) {
    values[k] = 5 + x + (drift * k) / length
    x = phi * x + normal()
  }
  return values
}

const exactTau = (phi: number) => (1 + phi) / (1 - phi) / 2
/** Standard error of the mean of a long series: sqrt(2 tau var/n). */
const exactError = (phi: number, n: number) => Math.sqrt((2 * exactTau(phi)) / (1 - phi * phi) / n)

describe("a first-order autoregressive series", () => {
  for (const phi of [0, 0.5, 0.9])
    test(`phi = ${phi}: autocorrelation time and blocking meet the exact values within their errors`, () => {
      const values = autoregressive(phi, 20_000, 4)
      const { tau, standardError } = autocorrelationTime(values)
      expect(Math.abs(tau - exactTau(phi))).toBeLessThan(3 * standardError + 1e-3)
      const { plateau } = blocking(values)
      expect(Math.abs(plateau!.standardError - exactError(phi, 20_000))).toBeLessThan(
        4 * plateau!.uncertainty + 0.1 * exactError(phi, 20_000),
      )
      const result = stationaryMean(values, "series")
      expect(result.warnings).toEqual([])
      expect(Math.abs(result.mean - 5)).toBeLessThan(3 * result.standardError)
    })
})

test("SERIES_TOO_SHORT below fifty autocorrelation times", () => {
  const { warnings } = stationaryMean(autoregressive(0.95, 400, 2), "series")
  expect(warnings.map(({ code }) => code)).toContain("SERIES_TOO_SHORT")
})

test("NOT_STATIONARY when the series drifts", () => {
  const { warnings } = stationaryMean(autoregressive(0.2, 5000, 2, 1), "series")
  expect(warnings.map(({ code }) => code)).toContain("NOT_STATIONARY")
})

test("a series that correlates over its whole length has no plateau", () => {
  const trend = Float64Array.from({ length: 256 }, (_, k) => k)
  expect(blocking(trend).plateau).toBeNull()
})

test("a constant has no error", () => {
  expect(stationaryMean(new Float64Array(100).fill(2), "series")).toMatchObject({
    mean: 2,
    standardError: 0,
    warnings: [],
  })
})
