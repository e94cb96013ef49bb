import { describe, expect, test } from "vitest"
import { normalQuantile } from "../distributions/normal-quantile"
import { randomStream } from "../random/random-stream"
import { arrivalTime } from "./arrival-times"
import { fitProfile } from "./fit-profile"
import { frontVelocity, type FrontOptions } from "./front-velocity"
import { MapError, type MapEnsemble } from "./map-ensemble"
import { momentumGrid, momentumTotal, normalisationWarnings } from "./momentum-distribution"
import { fullWidthHalfMaximum, profileMoments, unwrapRing } from "./profile-width"

const steps = (first: number, last: number, count: number) =>
  Float64Array.from({ length: count }, (_, k) => first + ((last - first) * k) / (count - 1))

describe("arrival time", () => {
  const t = Float64Array.of(0, 1, 2, 3, 4, 5)
  const half = { of: "value", level: 0.5 } as const
  test("linear between the samples around the crossing", () => {
    expect(arrivalTime(t, Float64Array.of(0, 0.2, 0.6, 0.9, 1, 1), half)).toBeCloseTo(1.75, 14)
  })
  test("a spike of one sample is not an arrival", () => {
    expect(arrivalTime(t, Float64Array.of(0, 0.7, 0.1, 0.1, 0.9, 1), half)).toBeCloseTo(3.5, 14)
  })
  test("neither a signal that starts above nor one that only just crosses at the end arrives", () => {
    expect(arrivalTime(t, Float64Array.of(1, 1, 1, 1, 1, 1), half)).toBeNaN()
    expect(arrivalTime(t, Float64Array.of(0, 0, 0, 0, 0, 1), half)).toBeNaN()
  })
  test("thresholds as fractions of the last and the largest value", () => {
    const signal = Float64Array.of(0, 1, 4, 4, 2, 2)
    expect(arrivalTime(t, signal, { of: "final", level: 0.5 })).toBeCloseTo(1, 14)
    expect(arrivalTime(t, signal, { of: "maximum", level: 0.5 })).toBeCloseTo(1 + 1 / 3, 14)
  })
})

/** Fronts of the given shape, each trajectory with its own small delay. */
function fronts(signal: (x: number, t: number) => number, trajectories = 12, delay = 0.3): MapEnsemble {
  const x = steps(2, 30, 15)
  const t = steps(0, 40, 161)
  const values = new Float64Array(trajectories * x.length * t.length)
  for (let i = 0; i < trajectories; i += 1) {
    const shift = delay * normalQuantile((randomStream(8, i).uint32() + 0.5) / 4294967296)
    x.forEach((at, a) =>
      t.forEach((time, k) => (values[(i * x.length + a) * t.length + k] = signal(at, time - shift))),
    )
  }
  return { x, t, values, ids: Array.from({ length: trajectories }, (_, i) => String(i)) }
}

const options: FrontOptions = {
  threshold: { of: "maximum", level: 0.5 },
  positions: [null, null],
  model: "ballistic",
}
const codes = (map: MapEnsemble, changed: Partial<FrontOptions> = {}) =>
  frontVelocity(map, { ...options, ...changed }, "front")!.warnings.map(({ code }) => code)

describe("front velocity", () => {
  const sharp = fronts((x, t) => 0.5 * (1 + Math.tanh(2 * (1.5 * t - x - 1))))

  test("of a front that keeps its shape, with all the trajectories' delays in the arrival times", () => {
    const result = frontVelocity(sharp, options, "front")!
    expect(result.velocity).toBeCloseTo(1.5, 3)
    expect(result.warnings).toEqual([])
    expect(result.censored).toBe(0)
    // Delays of 0.3 over 12 trajectories.
    result.arrivalError.forEach((error) =>
      expect(Math.abs(error / (0.3 / Math.sqrt(12)) - 1)).toBeLessThan(0.5),
    )
    expect(result.halves[0]).toBeCloseTo(result.halves[1], 2)
    expect(result.deletions).toHaveLength(12)
  })

  test("THRESHOLD_DEPENDENCE of the exclusion process, whose density c moves at 1 - 2 c (Rost 1981)", () => {
    const tasep = fronts((x, t) => (t > x ? (1 - x / t) / 2 : 0))
    const fixed = { threshold: { of: "value", level: 0.1 }, positions: [null, 20] } as const
    const result = frontVelocity(tasep, { ...options, ...fixed }, "front")!
    expect(result.velocity).toBeCloseTo(0.8, 2)
    expect(codes(tasep, fixed)).toContain("THRESHOLD_DEPENDENCE")
  })

  test("FRONT_NOT_STRAIGHT when it slows down", () => {
    expect(codes(fronts((x, t) => 0.5 * (1 + Math.tanh(2 * (6 * Math.sqrt(Math.max(t, 0)) - x)))))).toContain(
      "FRONT_NOT_STRAIGHT",
    )
  })

  test("positions that it does not reach are counted and left out", () => {
    const slow = frontVelocity(
      fronts((x, t) => 0.5 * (1 + Math.tanh(4 * (0.5 * t - x)))),
      { ...options, threshold: { of: "value", level: 0.5 } },
      "front",
    )!
    expect(slow.censored).toBe(6)
    expect(slow.velocity).toBeCloseTo(0.5, 3)
  })

  test("SINGLE_TRAJECTORY has a velocity without an error; fewer than four positions have none", () => {
    const single = frontVelocity(
      fronts((x, t) => 0.5 * (1 + Math.tanh(2 * (t - x))), 1, 0),
      options,
      "front",
    )!
    expect(single.velocity).toBeCloseTo(1, 3)
    expect(single.warnings.map(({ code }) => code)).toEqual(["SINGLE_TRAJECTORY"])
    expect(frontVelocity(sharp, { ...options, positions: [2, 6] }, "front")).toBeNull()
  })

  test("a missing value is refused by name", () => {
    const values = sharp.values.slice()
    values[5 * 161 + 3] = Number.NaN
    expect(() => frontVelocity({ ...sharp, values }, options, "front")).toThrow(MapError)
  })
})

describe("widths", () => {
  const x = steps(-20, 20, 801)

  test("of a sech^2 pulse: variance pi^2 w^2/12 and full width 1.7627 w", () => {
    const pulse = x.map((at) => 1 / Math.cosh((at - 1.5) / 2) ** 2)
    const { total, mean, variance } = profileMoments(x, pulse)
    expect(total).toBeCloseTo(4, 6)
    expect(mean).toBeCloseTo(1.5, 6)
    expect(variance).toBeCloseTo((Math.PI ** 2 * 4) / 12, 4)
    expect(fullWidthHalfMaximum(x, pulse)).toBeCloseTo(2 * 1.7627, 3)
    const fit = fitProfile(
      "pulse",
      x,
      pulse.map((y) => 3 * y + 0.5),
    )!
    expect([fit.centre, fit.width, fit.amplitude, fit.background]).toEqual(
      [1.5, 2, 3, 0.5].map((value) => expect.closeTo(value, 9)),
    )
    expect(fit.conventionalWidth).toBeCloseTo(2 * 1.7627, 3)
    expect(fit.confirmed).toBe(true)
  })

  test("of a tanh edge: 2.197 w between 10 % and 90 %", () => {
    const edge = x.map((at) => 0.2 + 0.35 * (1 + Math.tanh((at + 4) / 3)))
    const fit = fitProfile("edge", x, edge)!
    expect([fit.centre, fit.width, fit.amplitude, fit.background]).toEqual(
      [-4, 3, 0.7, 0.2].map((value) => expect.closeTo(value, 8)),
    )
    expect(fit.conventionalWidth / 3).toBeCloseTo(2.197, 3)
  })

  test("a background shifts neither height nor width; a profile cut at its side has no full width", () => {
    const pulse = x.map((at) => 0.4 + Math.exp(-at * at))
    expect(fullWidthHalfMaximum(x, pulse, 0.4)).toBeCloseTo(2 * Math.sqrt(Math.LN2), 3)
    expect(
      fullWidthHalfMaximum(
        x,
        x.map((at) => Math.exp(at)),
      ),
    ).toBeNaN()
  })

  test("a peak across the seam of a ring is kept whole", () => {
    const sites = Float64Array.from({ length: 32 }, (_, j) => j)
    const onRing = sites.map((j) => Math.exp(-(Math.min(j, 32 - j) ** 2) / 8))
    const ring = unwrapRing(sites, onRing, 32)
    const profile = Float64Array.from(ring.order, (k) => onRing[k]!)
    const { mean, variance } = profileMoments(ring.x, profile)
    expect(mean).toBeCloseTo(0, 6)
    expect(variance).toBeCloseTo(4, 2)
  })

  test("four points are not a profile", () => {
    expect(fitProfile("pulse", x.slice(0, 4), x.slice(0, 4))).toBeNull()
  })
})

describe("momentum distribution", () => {
  test("grid of even and odd rings, the edge counted once", () => {
    expect([...momentumGrid(4)].map((k) => k / Math.PI)).toEqual([-1, -0.5, 0, 0.5])
    expect([...momentumGrid(3)].map((k) => (3 * k) / (2 * Math.PI))).toEqual([-1, 0, 1])
  })

  test("a half-filled Fermi sea holds L/2 particles as modes and density 1/2", () => {
    const k = momentumGrid(64)
    const filled = k.map((value) => (value >= -Math.PI / 2 && value < Math.PI / 2 ? 1 : 0))
    expect(momentumTotal(k, filled, "modes")).toBe(32)
    expect(momentumTotal(k, filled, "density")).toBeCloseTo(0.5, 12)
  })

  test("NORMALISATION beyond one part in a thousand", () => {
    expect(normalisationWarnings(32.5, 32, "n(k)").map(({ message }) => message)).toEqual([
      "The distribution sums to 32.5, not 32.",
    ])
    expect(normalisationWarnings(32.02, 32, "n(k)")).toEqual([])
  })
})
