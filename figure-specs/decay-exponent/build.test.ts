import { describe, expect, test } from "vitest"
import { defaultLook } from "../chart/look"
import type { Frame } from "../chart/drawing"
import { build } from "./build"
import { handMadeResult } from "@tests/support/hand-made-result"
import { decayExponentParams } from "./params"

const params = (changes: object = {}) =>
  decayExponentParams.parse({
    kind: "decay-exponent",
    data: { dataset: "d", columns: { trajectory: "run", time: "t", observable: "n" } },
    ...changes,
  })
const frame: Frame = { widthPt: 200, heightPt: 140, look: defaultLook }

/** JSON with one row of data a line, so that a change of a drawing reads as a change. */
const golden = (value: unknown) =>
  `${JSON.stringify(value, null, 2).replace(/([{[])\s+([^{}[\]]*?)\s+([}\]])/g, (_, open, inside, close) => `${open}${(inside as string).replace(/\s*\n\s*/g, " ")}${close}`)}\n`

describe("the drawing of a decay panel", () => {
  test("three curves with fits and a reference slope, as compiled", async () => {
    const drawing = build(handMadeResult(3, 14), params({ references: [{ exponent: -0.5 }] }), frame)
    await expect(golden(drawing)).toMatchFileSnapshot("./build.golden.json")
  })

  test("scattered points stand alone, crowded ones are joined and say how many carry a marker", () => {
    const scattered = build(handMadeResult(3, 20), params(), frame)
    const crowded = build(handMadeResult(3, 200), params(), frame)
    expect(scattered.notes).toEqual([])
    expect(scattered.legend.entries.map(({ dash }) => dash)).toEqual([null, null, null, []])
    expect(crowded.notes.join()).toMatch(
      /^Markers and error bars stand at \d+ of 200( and \d+ of 200)* times\.$/,
    )
    expect(crowded.legend.entries[1]).toMatchObject({ marker: "square", dash: defaultLook.dashes[1] })
  })

  test("the fit is solid in its window and dashed only outside", () => {
    const { spec } = build(handMadeResult(1), params(), frame)
    const rows = (name: string) =>
      (spec.data!.find((table) => table.name === name) as { values: { t: number; gap?: boolean }[] }).values
    const [low, high] = handMadeResult(1).curves[0]!.fit!.window
    expect(rows("fit-0").every(({ t }) => t >= low && t <= high)).toBe(true)
    expect(rows("band-0").every(({ t }) => t >= low && t <= high)).toBe(true)
    const outside = rows("extrapolation-0").filter(({ gap }) => !gap)
    expect(outside.filter(({ t }) => t >= low && t <= high)).toHaveLength(2)
  })

  test("each curve differs from the others in colour and in marker", () => {
    const { entries } = build(handMadeResult(3), params(), frame).legend
    expect(new Set(entries.map(({ color }) => color)).size).toBe(4)
    expect(new Set(entries.map(({ marker }) => marker)).size).toBe(4)
  })

  test("titles come from the columns unless the spec gives them", () => {
    const { axes } = build(handMadeResult(1), params(), frame)
    expect(axes.x.title).toBe("$t$ [$1/J$]")
    expect(axes.y.title).toBe("$\\langle n(t)\\rangle$")
    const given = build(handMadeResult(1), params({ axes: { x: { label: "time" }, y: {} } }), frame)
    expect(given.axes.x.title).toBe("time")
  })

  test("a single curve carries its fitted law, several share a legend", () => {
    expect(build(handMadeResult(1), params(), frame).labels[0]!.text).toBe("$\\propto t^{-0.498(6)}$")
    expect(build(handMadeResult(1), params(), frame).legend.entries).toEqual([])
    const { labels, legend } = build(handMadeResult(3), params(), frame)
    expect(labels).toEqual([])
    expect(legend.entries.map(({ label }) => label)).toEqual([
      "$\\nu$ = 0.1",
      "$\\nu$ = 0.2",
      "$\\nu$ = 0.4",
      "fit",
    ])
  })

  test("a mean below its error is drawn with a bar cut at the frame", () => {
    const result = handMadeResult(1, 20)
    const curve = result.curves[0]!
    const standardError = curve.standardError.map((error, k) => (k === 19 ? curve.mean[k]! * 2 : error))
    const drawing = build({ ...result, curves: [{ ...curve, standardError }] }, params(), frame)
    const bars = drawing.spec.data!.find(({ name }) => name === "bars-0") as { values: { path: string }[] }
    expect(bars.values[0]!.path).toMatch(/V160$/)
    expect(JSON.stringify(drawing)).not.toMatch(/NaN|Infinity/)
  })

  test("the description names curves, fits and ranges", () => {
    const { alternativeText } = build(handMadeResult(3), params({ references: [{ exponent: -0.5 }] }), frame)
    expect(alternativeText).toContain("3 curves for nu = 0.1, 0.2, 0.4")
    expect(alternativeText).toContain("0.2: exponent \u22120.500(6) for t from 30 to 3000")
    expect(alternativeText).toContain("Reference slope -0.5")
  })
})
