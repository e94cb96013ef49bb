import { describe, expect, test } from "vitest"
import { axisOf, paddedDomain } from "./axis"
import { linearTicks, niceStep } from "./linear-ticks"
import { defaultLook } from "./look"
import { logTicks } from "./log-ticks"

const plenty = () => 100
const labels = (ticks: { major: readonly { label: string }[] }) => ticks.major.map(({ label }) => label)

// Expected ticks follow from the definitions: powers of ten and their multiples, steps of 1, 2 and 5.
describe("logarithmic ticks", () => {
  test("powers of ten carry the numbers, the multiples between are minor", () => {
    const ticks = logTicks([0.5, 2000], plenty, 200)
    expect(labels(ticks)).toEqual(["$10^{0}$", "$10^{1}$", "$10^{2}$", "$10^{3}$"])
    expect(ticks.minor).toContain(0.5)
    expect(ticks.minor).toContain(2000)
    expect(ticks.minor).not.toContain(10)
    expect(ticks.minor).not.toContain(0.4)
    expect(ticks.minor).toHaveLength(5 + 3 * 8 + 1)
  })

  test("crowded decades keep their ticks and lose every second number", () => {
    const ticks = logTicks([1e-6, 1e6], () => 8, 120)
    expect(labels(ticks).filter((label) => label !== "")).toEqual(
      [-6, -4, -2, 0, 2, 4, 6].map((exponent) => `$10^{${exponent}}$`),
    )
    expect(ticks.major).toHaveLength(13)
    expect(ticks.minor).toEqual([])
  })

  test("an axis with fewer than two decades also numbers multiples", () => {
    expect(labels(logTicks([0.15, 1.2], () => 5, 150))).toEqual(["0.2", "0.5", "1"])
    expect(labels(logTicks([2e-6, 3e-5], () => 5, 150))).toEqual([
      "$2\\times10^{-6}$",
      "$5\\times10^{-6}$",
      "$10^{-5}$",
      "$2\\times10^{-5}$",
    ])
  })

  test("a very short axis is divided evenly", () => {
    expect(labels(logTicks([0.92, 1.04], () => 6, 150))).toEqual(["0.95", "1.00"])
  })
})

describe("linear ticks", () => {
  test.each([
    [0.3, 0.5],
    [0.2, 0.2],
    [6, 10],
    [1.1, 2],
  ])("the step for %d is %d", (rough, step) => expect(niceStep(rough)).toBeCloseTo(step, 12))

  test("numbers share their decimals and have a true minus", () => {
    expect(labels(linearTicks([-0.55, 0.5], () => 6))).toEqual([
      "\u22120.4",
      "\u22120.2",
      "0.0",
      "0.2",
      "0.4",
    ])
  })

  test("fewer numbers where fewer fit", () => {
    expect(linearTicks([0, 10], () => 3).major.map(({ value }) => value)).toEqual([0, 5, 10])
  })

  test("long numbers are written in units of a power of ten", () => {
    const { power, major } = linearTicks([0, 300000], () => 4)
    expect(power).toBe(5)
    expect(major.map(({ label }) => label)).toEqual(["0", "1", "2", "3"])
    const axis = axisOf({
      title: "$N$",
      scale: "linear",
      domain: [0, 300000],
      direction: "horizontal",
      lengthPt: 120,
      look: defaultLook,
    })
    expect([axis.title, axis.factor]).toEqual(["$N$", "×\u2009$10^{5}$"])
  })
})

describe("domains", () => {
  test("a margin on both sides in the measure of the axis", () => {
    expect(paddedDomain([0, 10], "linear", 0.1)).toEqual([-1, 11])
    const [low, high] = paddedDomain([2, 200], "log", 0.05)
    expect(low).toBeCloseTo(2 / 100 ** 0.05, 9)
    expect(high).toBeCloseTo(200 * 100 ** 0.05, 9)
  })

  test("an end near a power of ten is put there", () => {
    expect(paddedDomain([0.013, 0.8], "log", 0.06)).toEqual([0.01, 1])
  })

  test("values that a log axis cannot show do not count; without any there is a default", () => {
    expect(paddedDomain([-1, 0, 2, 200, NaN], "log", 0.05)).toEqual(paddedDomain([2, 200], "log", 0.05))
    expect(paddedDomain([NaN], "linear", 0.05)).toEqual([0, 1])
  })
})
