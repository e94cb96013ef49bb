import { readFileSync } from "node:fs"
import { describe, expect, test } from "vitest"
import { arrivalTime } from "@/lib/stats/fronts/arrival-times"
import { frontLine } from "@/lib/stats/fronts/front-line"
import { profileMoments } from "@/lib/stats/fronts/profile-width"
import { fitLawGivenErrors } from "@/lib/stats/laws/fit-law-given-errors"
import { laws } from "@/lib/stats/laws/laws"

const read = (file: string) =>
  JSON.parse(readFileSync(new URL(`./data/physics/${file}.json`, import.meta.url), "utf8"))

describe("pair annihilation in one dimension, exact from the full lattice", () => {
  const law = read("bessel_law")
  const late = (law.Gt as number[]).flatMap((t, k) => (t >= 50 ? [{ t, n: Number(law.n_full[k]) }] : []))
  const t = Float64Array.from(late, (row) => row.t)
  const y = Float64Array.from(late, (row) => row.n)
  const points = { t, y, sigma: y.map((n) => 1e-3 * n) }
  const fit = (id: "power-law" | "power-law-offset") => {
    const result = fitLawGivenErrors(laws[id], points, [null, null], { resamples: 0, seed: 0 })
    if ("refused" in result) throw new Error(result.refused)
    return result.fit.parameters
  }

  test("the power law meets the exponent -1/2 and the amplitude (4 pi)^(-1/2) up to the correction 1/(16 t)", () => {
    const [amplitude, exponent] = fit("power-law")
    expect(Math.abs(exponent! + 0.5)).toBeLessThan(2e-4)
    expect(Math.abs(amplitude! * Math.sqrt(4 * Math.PI) - 1)).toBeLessThan(1.5e-3)
  })

  test("an offset is found to be none", () => {
    const [, exponent, offset] = fit("power-law-offset")
    expect(Math.abs(exponent! + 0.5)).toBeLessThan(1e-3)
    expect(Math.abs(offset!)).toBeLessThan(1e-5)
  })
})

test("a width with an intrinsic part: w^2 = C + A t^(2 beta) gives beta = 1/3 where the plain slope is too small", () => {
  // KPZ, d = 1; the finite-window trap of the file.
  const { beta } = read("exact_values").values.find(({ name }: { name: string }) => name === "KPZ d=1")
  const t = Float64Array.from({ length: 25 }, (_, k) => 10 ** (k / 8))
  const y = t.map((at) => 0.8 + 0.5 * at ** (2 * beta))
  const result = fitLawGivenErrors(
    laws["power-law-offset"],
    { t, y, sigma: y.map((v) => 0.01 * v) },
    [null, null],
    {
      resamples: 0,
      seed: 0,
    },
  )
  if ("refused" in result) throw new Error(result.refused)
  expect(result.fit.parameters[1]! / 2).toBeCloseTo(beta, 10)
  const plain = Math.log(y[24]! / y[12]!) / Math.log(t[24]! / t[12]!) / 2
  expect(plain).toBeLessThan(beta - 0.005)
})

/** J_0(z) .. J_m(z) by downward recurrence, normalised by J_0 + 2 sum J_2k = 1. @see DLMF 10.74(iv) */
function besselJ(z: number, orders: number): Float64Array {
  const start = Math.max(orders, Math.ceil(z)) + 60
  const values = new Float64Array(start + 2)
  values[start] = 1e-300
  for (let m = start; m > 0; m -= 1) {
    values[m - 1] = ((2 * m) / z) * values[m]! - values[m + 1]!
    if (Math.abs(values[m - 1]!) > 1e200)
      for (let k = m - 1; k <= start; k += 1) values[k] = values[k]! * 1e-250
  }
  let sum = values[0]!
  for (let m = 2; m <= start; m += 2) sum += 2 * values[m]!
  return values.map((value) => value / sum)
}

describe("free lattice particles, J = 1", () => {
  test("spreading of one particle: <x^2> = 2 t^2", () => {
    for (const t of [3, 10, 30]) {
      const j = besselJ(2 * t, 120)
      const x = Float64Array.from({ length: 241 }, (_, k) => k - 120)
      const { total, mean, variance } = profileMoments(
        x,
        x.map((at) => j[Math.abs(at)]! ** 2),
      )
      expect(total).toBeCloseTo(1, 10)
      expect(mean).toBeCloseTo(0, 10)
      expect(variance / (2 * t * t)).toBeCloseTo(1, 9)
    }
  })

  test("front of one particle: v = 2 with the t^(1/3) term, a biased value without it", () => {
    // At fixed x the first maximum of J_x(2 t)^2 has one shape in (x - 2 t)/t^(1/3), so a fixed part of its height follows
    // x = 2 t + d t^(1/3). Hunyadi, Racz & Sasvari, Phys. Rev. E 69, 066103 (2004).
    const t = Float64Array.from({ length: 480 }, (_, k) => (k + 1) / 4)
    const density = Array.from(t, (at) => besselJ(2 * at, 260).map((j) => j * j))
    const x = Float64Array.from({ length: 16 }, (_, k) => 20 + 10 * k)
    const arrived = x.map((at) =>
      arrivalTime(
        t,
        t.map((_, k) => density[k]![at] ?? 0),
        { of: "maximum", level: 0.02 },
      ),
    )
    const plain = frontLine(x, arrived, "ballistic").velocity
    const { velocity, widening } = frontLine(x, arrived, "airy")
    expect(Math.abs(plain - 2)).toBeGreaterThan(0.02)
    expect(Math.abs(velocity - 2)).toBeLessThan(0.002)
    expect(widening).toBeGreaterThan(0)
  })
})
