import { describe, expect, test } from "vitest"
import { normalQuantile } from "../distributions/normal-quantile"
import type { Ensemble } from "../ensemble/ensemble"
import { nelderMead } from "../nonlinear/nelder-mead"
import { randomStream } from "../random/random-stream"
import { collapseContour } from "./collapse-contour"
import { collapseQuality } from "./collapse-quality"
import { resampleCollapse } from "./collapse-resamples"
import { collapseWarnings, saturationWarnings } from "./collapse-warnings"
import { fitCollapse, type CollapseFit } from "./fit-collapse"
import { sizeCurve, type SizeCurve } from "./size-curve"

const sizes = [32, 64, 128, 256]
const times = Float64Array.from({ length: 40 }, (_, k) => 10 ** (k / 10))
/** Family–Vicsek form of a growing width: (t^(2 beta) saturating at L^(2 a))^(1/2), a = 1/2 and z = 3/2 (KPZ, d = 1). */
const width = (t: number, size: number, a = 0.5, z = 1.5) =>
  size ** a * Math.sqrt(-Math.expm1(-((t / size ** z) ** ((2 * a) / z))))

const normals = (seed: number, index: number) => {
  const stream = randomStream(seed, index)
  return () => normalQuantile((stream.uint32() + 0.5) / 4294967296)
}

function curvesOf(noise: number, stated: number, correction = 0): SizeCurve[] {
  return sizes.map((size, s) => {
    const normal = normals(21, s)
    const y = times.map((t) => width(t, size) * (1 + correction / size) * (1 + noise * normal()))
    return sizeCurve(
      size,
      times,
      y,
      y.map((v) => stated * v),
    )!
  })
}

test("Nelder–Mead finds the minimum of Rosenbrock's valley and of a function with a kink", () => {
  const valley = nelderMead(
    ([x, y]) => (1 - x!) ** 2 + 100 * (y! - x! * x!) ** 2,
    [-1.2, 1],
    [0.5, 0.5],
    1e-8,
  )
  expect([...valley.point]).toEqual([expect.closeTo(1, 6), expect.closeTo(1, 6)])
  expect(valley.converged).toBe(true)
  const kink = nelderMead(([x]) => Math.abs(x! - 0.3), [4], [1], 1e-8)
  expect(kink.point[0]).toBeCloseTo(0.3, 6)
  expect(nelderMead(([x]) => (x! - 9) ** 2, [0], [0.001], 1e-12, 20).converged).toBe(false)
})

describe("quality S", () => {
  test("two straight lines a distance d apart: S = d^2/(e^2 + dY^2), by hand", () => {
    const line = (shift: number, lnSize: number): SizeCurve => ({
      lnSize,
      x: Float64Array.of(0, 1, 2),
      y: Float64Array.of(shift, shift + 1, shift + 2),
      error: Float64Array.of(0.1, 0.1, 0.1),
    })
    const other: SizeCurve = {
      ...line(0.3, 0),
      x: Float64Array.of(0.5, 1.5),
      y: Float64Array.of(0.8, 1.8),
      error: Float64Array.of(0.1, 0.1),
    }
    // Enclosed: x = 1 of the first (line half way between two points, dY^2 = e^2/2); 0.5 and 1.5 of the second likewise.
    const { quality, points } = collapseQuality([line(0, 0), other], { a: 0, z: 0 })
    expect(points).toBe(3)
    expect(quality).toBeCloseTo(0.3 ** 2 / (0.01 * 1.5), 12)
  })

  test("near 1 for the true exponents with honest errors, far above for wrong ones", () => {
    const curves = curvesOf(0.02, 0.02)
    const { quality } = collapseQuality(curves, { a: 0.5, z: 1.5 })
    expect(quality).toBeGreaterThan(0.7)
    expect(quality).toBeLessThan(1.3)
    expect(collapseQuality(curves, { a: 0.6, z: 1.5 }).quality).toBeGreaterThan(10)
  })

  test("is infinite without overlap", () => {
    expect(collapseQuality(curvesOf(0, 0.02), { a: 0.5, z: 30 })).toEqual({ quality: Infinity, points: 0 })
  })
})

describe("exponents", () => {
  const curves = curvesOf(0.02, 0.02)
  const fit = fitCollapse(curves, { a: 0.6, z: 1.3 })!

  test("of the width of a growing surface", () => {
    expect(fit.a).toBeCloseTo(0.5, 1)
    expect(fit.z).toBeCloseTo(1.5, 1)
    expect(Math.abs(fit.a - 0.5)).toBeLessThan(0.02)
    expect(fit).toMatchObject({ converged: true, confirmed: true })
  })

  test("S rises by 1 at the ends of the contour, which holds the truth", () => {
    const [low, high] = collapseContour(curves, fit, "a")
    expect(low).toBeLessThan(0.5)
    expect(high).toBeGreaterThan(0.5)
    const constrained = fitCollapse(curves, fit, { kind: "fixed-a", a: high })!
    expect(constrained.quality).toBeCloseTo(fit.quality + 1, 2)
  })

  test("a relation is a fit of its own", () => {
    const galilean = fitCollapse(curves, { a: 0.6, z: 1.3 }, { kind: "sum", sum: 2 })!
    expect(galilean.a + galilean.z).toBeCloseTo(2, 12)
    expect(galilean.quality).toBeGreaterThanOrEqual(fit.quality - 1e-6)
    expect(fitCollapse(curves, { a: 0.6, z: 1.3 }, { kind: "fixed-z", z: 1.5 })!.z).toBe(1.5)
  })

  test("exact curves collapse onto the exact exponents", () => {
    // The lines between neighbours of a bent curve leave S a little above zero and its minimum a little off.
    const exact = fitCollapse(curvesOf(0, 0.02), { a: 0.6, z: 1.3 })!
    expect(exact.a).toBeCloseTo(0.5, 2)
    expect(exact.z).toBeCloseTo(1.5, 2)
  })

  test("no overlap at the guess, no fit", () => {
    expect(fitCollapse(curves, { a: 0.5, z: 30 })).toBeNull()
  })
})

test("resamples of trajectories within each size: joint errors that hold the truth and KPZ's a + z = 2", () => {
  const ensembles = sizes.slice(0, 3).map((size, s) => {
    const values = Float64Array.from({ length: 12 * 40 }, () => 0)
    for (let i = 0; i < 12; i += 1) {
      const normal = normals(100 + s, i)
      times.forEach((t, k) => (values[i * 40 + k] = width(t, size) * (1 + 0.05 * normal())))
    }
    const ensemble: Ensemble = {
      abscissa: times,
      values,
      ids: Array.from({ length: 12 }, (_, i) => String(i)),
    }
    return { size, ensemble }
  })
  const run = () =>
    resampleCollapse(
      ensembles,
      [null, null],
      { a: 0.55, z: 1.4 },
      { kind: "free" },
      { resamples: 60, seed: 3 },
    )
  const result = run()
  if ("refused" in result) throw new Error(result.refused)
  const deviation = (values: Float64Array, about: number) =>
    Math.sqrt(values.reduce((sum, v) => sum + (v - about) ** 2, 0) / values.length)
  const errorOfA = deviation(result.a, result.fit.a)
  expect(errorOfA).toBeGreaterThan(0)
  expect(Math.abs(result.fit.a - 0.5)).toBeLessThan(3 * errorOfA)
  const sums = result.a.map((a, r) => a + result.z[r]!)
  expect(Math.abs(result.fit.a + result.fit.z - 2)).toBeLessThan(
    3 * deviation(sums, result.fit.a + result.fit.z),
  )
  expect(run()).toEqual(result)
})

test("a mean that is not positive, or curves apart, are refused", () => {
  const flat = (value: number): Ensemble => ({
    abscissa: times,
    values: new Float64Array(80).fill(value),
    ids: ["1", "2"],
  })
  const options = [[null, null], { a: 0, z: 1 }, { kind: "free" }, { resamples: 0, seed: 1 }] as const
  expect(
    resampleCollapse(
      [
        { size: 8, ensemble: flat(0) },
        { size: 16, ensemble: flat(1) },
      ],
      ...options,
    ),
  ).toEqual({ refused: "NONPOSITIVE_MEANS" })
  const far = [
    { size: 1, ensemble: flat(1) },
    { size: 1e9, ensemble: flat(1) },
  ]
  expect(resampleCollapse(far, ...options)).toEqual({ refused: "NO_OVERLAP" })
})

describe("warnings", () => {
  const good = curvesOf(0.02, 0.02)
  const fit = fitCollapse(good, { a: 0.6, z: 1.3 })!
  const errors = { a: 0.01, z: 0.03 }
  const codes = (curves: readonly SizeCurve[], change: Partial<CollapseFit> = {}, given = errors) =>
    collapseWarnings(curves, { ...fit, ...change }, given, true, "collapse").map(({ code }) => code)

  test("none for a good collapse", () => expect(codes(good)).toEqual([]))
  test("COLLAPSE_POOR and CHI2_TOO_SMALL by S", () => {
    expect(codes(good, { quality: 9 })).toEqual(["COLLAPSE_POOR"])
    expect(codes(good, { quality: 0.03 })).toEqual(["CHI2_TOO_SMALL"])
  })
  test("NO_CONVERGENCE, MULTIPLE_MINIMA and a solution at the edge of the overlap", () => {
    expect(codes(good, { converged: false })).toEqual(["NO_CONVERGENCE"])
    expect(codes(good, { confirmed: false })).toEqual(["MULTIPLE_MINIMA"])
    expect(codes(good, { points: 0.81 * fit.pointsAtGuess })).toEqual(["BOUNDARY_SOLUTION"])
  })
  test("FINITE_SIZE_SUSPECT when the smallest size pulls the exponents", () => {
    const corrected = curvesOf(0.002, 0.002, 8)
    const pulled = fitCollapse(corrected, { a: 0.6, z: 1.3 })!
    expect(
      collapseWarnings(corrected, pulled, { a: 0.001, z: 0.003 }, true, "collapse").map(({ code }) => code),
    ).toContain("FINITE_SIZE_SUSPECT")
  })
  test("FINITE_SIZE_SUSPECT for a window beyond a tenth of the saturation time", () => {
    expect(saturationWarnings(200, 64, 1.5, "growth").map(({ code }) => code)).toEqual([
      "FINITE_SIZE_SUSPECT",
    ])
    expect(saturationWarnings(50, 64, 1.5, "growth")).toEqual([])
  })
})
