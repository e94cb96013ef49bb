import { readFileSync } from "node:fs"
import { describe, expect, test } from "vitest"
import { simulateCornerGrowth } from "./corner-growth"
import { simulateExclusionFront } from "./exclusion-front"
import { simulateMomenta } from "./bath-momenta"
import { logTimes } from "./log-times"
import { simulateMeetingTimes } from "./meeting-times"
import { simulateMerging } from "./merging-clusters"
import { simulateAnnihilation } from "./pair-annihilation"

/** Mean over trajectories at each index, and its standard error. */
function summary(rows: readonly Float64Array[]) {
  const m = rows.length
  return Array.from(rows[0]!, (_, k) => {
    const mean = rows.reduce((sum, row) => sum + row[k]!, 0) / m
    const squares = rows.reduce((sum, row) => sum + (row[k]! - mean) ** 2, 0)
    return { mean, error: Math.sqrt(squares / (m - 1) / m) }
  })
}

/** All within four standard errors: for the few dozen numbers here a false alarm has odds of about 1 in 500, and the seed is fixed. */
const within = 4

describe("pair annihilation", () => {
  test("the density follows exp(-2 G t) I0(2 G t)", () => {
    // tests/reference/data/physics/bessel_law.json: Glauber, J. Math. Phys. 4, 294 (1963) by duality.
    const law = JSON.parse(
      readFileSync(new URL("../../tests/reference/data/physics/bessel_law.json", import.meta.url), "utf8"),
    ) as { Gt: number[]; n_full: string[] }
    const chosen = law.Gt.map((gt, k) => ({ gt, exact: Number(law.n_full[k]!) })).filter(
      ({ gt }) => gt >= 0.1 && gt <= 500,
    )
    const rate = 2
    const times = chosen.map(({ gt }) => gt / rate)
    const means = summary(simulateAnnihilation({ sites: 1000, trajectories: 200, rate, times, seed: 3 }))
    chosen.forEach(({ exact }, k) =>
      expect(Math.abs(means[k]!.mean - exact)).toBeLessThan(within * means[k]!.error),
    )
    expect(means.at(-1)!.error / means.at(-1)!.mean).toBeLessThan(0.03)
  })

  test("one seed, one table", () => {
    const settings = { sites: 50, trajectories: 2, rate: 1, times: [0, 1, 10], seed: 5 }
    expect(simulateAnnihilation(settings)).toEqual(simulateAnnihilation(settings))
    expect(simulateAnnihilation({ ...settings, seed: 6 })).not.toEqual(simulateAnnihilation(settings))
  })
})

describe("corner growth", () => {
  test("the flat start has w^2 = 1/4, the stationary ring (L + 1)/12", () => {
    // Steps +1 and -1 in uniformly random order on a closed path: arithmetic (variance of a discrete bridge).
    const sites = 32
    const [start, ...late] = summary(
      simulateCornerGrowth({ sites, trajectories: 400, times: [0, 1000, 2000], seed: 7 }),
    )
    expect(start!.mean).toBe(0.25)
    for (const { mean, error } of late) expect(Math.abs(mean - (sites + 1) / 12)).toBeLessThan(within * error)
  })

  test("early growth has the exact amplitude 0.63805 (t/2)^(2/3), up to a constant below 1/2", () => {
    // Flat start, variance of the GOE Tracy-Widom variable in this scale: Prähofer & Spohn, Phys. Rev. Lett. 84, 4882
    // (2000); A = 1, lambda = -1 for this model, so Gamma = 1/2 (from memory).
    const times = [30, 100, 300]
    const means = summary(simulateCornerGrowth({ sites: 512, trajectories: 60, times, seed: 8 }))
    times.forEach((t, k) => {
      const excess = means[k]!.mean - 0.63805 * (t / 2) ** (2 / 3)
      expect(excess).toBeGreaterThan(-within * means[k]!.error)
      expect(excess).toBeLessThan(0.5 + within * means[k]!.error)
    })
  })
})

describe("the exclusion process from a step", () => {
  test("the foremost particle is free, the density is (1 - x/t)/2 in between", () => {
    // Rost, Z. Wahrsch. verw. Geb. 58, 41 (1981).
    const cell = 16
    const cells = [-408, -208, -8, 192, 392]
    const t = 800
    const means = summary(simulateExclusionFront({ trajectories: 60, times: [t], cells, cell, seed: 9 }))
    cells.forEach((left, c) => {
      const exact = (1 - (left + (cell - 1) / 2) / t) / 2
      // Corrections to the law of large numbers are of relative order t^(-2/3), about 0.01 here.
      expect(Math.abs(means[c]!.mean - exact)).toBeLessThan(0.01 + within * means[c]!.error)
    })
  })

  test("particles are conserved", () => {
    const cells = [-200, -100, 0, 100]
    const [row] = simulateExclusionFront({ trajectories: 1, times: [0, 60], cells, cell: 100, seed: 10 })
    const particles = (time: number) => cells.reduce((sum, _, c) => sum + 100 * row![4 * time + c]!, 0)
    // Sites -200..0 are full at the start; within t = 60 nothing has left the cells.
    expect(particles(0)).toBe(201)
    expect(particles(1)).toBe(201)
  })
})

test("two walkers on a ring meet after L^2 / (8 G) on average", () => {
  // (L/2)^2 steps of the distance at rate 2 G: Feller, volume I, chapter XIV.3.
  const [{ mean, error }] = summary(
    Array.from(simulateMeetingTimes(32, 2, 2000, 11), (time) => Float64Array.of(time)),
  ) as [{ mean: number; error: number }]
  expect(Math.abs(mean - 32 ** 2 / 16)).toBeLessThan(within * error)
})

test("the mean size of merging clusters is 1/(1 - t)", () => {
  // Erdős & Rényi 1960; corrections are of relative order 1/(N (1 - t)^3), below 0.01 here.
  const times = [0, 0.3, 0.6, 0.8]
  const means = summary(simulateMerging({ particles: 50_000, trajectories: 20, times, seed: 12 }))
  expect(means[0]!.mean).toBe(1)
  times.slice(1).forEach((t, k) => {
    const { mean, error } = means[k + 1]!
    expect(Math.abs(mean - 1 / (1 - t))).toBeLessThan(within * error + 0.01 * mean)
  })
})

test("momenta in a bath have the variance of an Ornstein-Uhlenbeck process", () => {
  // hot + (cold - hot) exp(-2 t): Uhlenbeck & Ornstein 1930; bins of width h add h^2/12 (Sheppard).
  const edges = Array.from({ length: 66 }, (_, k) => -6.5 + 0.2 * k)
  const times = [0, 0.5, 2]
  const rows = simulateMomenta({
    particles: 500,
    trajectories: 40,
    times,
    cold: 0.25,
    hot: 1,
    edges,
    seed: 13,
  })
  const bins = edges.length - 1
  const variances = rows.map((counts) =>
    Float64Array.from(times, (_, k) => {
      const moment = (power: number) =>
        edges.slice(1).reduce((sum, edge, b) => sum + (edge - 0.1) ** power * counts[k * bins + b]!, 0) / 500
      return moment(2) - moment(1) ** 2
    }),
  )
  summary(variances).forEach(({ mean, error }, k) => {
    // A variance about each trajectory's own mean of 500 particles is short by one part in 500.
    const exact = (1 + (0.25 - 1) * Math.exp(-2 * times[k]!)) * (499 / 500) + 0.2 ** 2 / 12
    expect(Math.abs(mean - exact)).toBeLessThan(within * error)
  })
})

test("log-spaced times are increasing and end where they should", () => {
  const times = logTimes(0.1, 1000, 10)
  expect(times).toHaveLength(41)
  expect(times[0]).toBe(0.1)
  expect(times.at(-1)).toBe(1000)
})
