import { describe, expect, test } from "vitest"
import { annotations as schema, type Annotation } from "../schema/annotations"
import { annotationShapes } from "./annotation-shapes"
import type { AxisDrawing, Frame, PanelDrawing } from "./drawing"
import { insideShapes } from "./inside-shapes"
import { defaultLook } from "./look"

const axis = (scale: "log" | "linear", domain: [number, number]): AxisDrawing => ({
  title: "",
  scale,
  domain,
  major: [],
  minor: [],
})
const frame: Frame = { widthPt: 200, heightPt: 100, look: defaultLook }
const drawing = (annotations: readonly Annotation[], scale: "log" | "linear" = "log"): PanelDrawing => ({
  spec: {},
  axes: { x: axis(scale, [1, 100]), y: axis(scale, [1, 100]) },
  legend: {
    title: null,
    entries: [{ label: "a", color: "#000000", marker: "circle", dash: null, widthPt: 1 }],
  },
  labels: [],
  colorBar: null,
  annotations,
  notes: [],
  alternativeText: "",
})
const shapesOf = (input: unknown, scale: "log" | "linear" = "log") => {
  const annotations = schema.parse(input)
  return annotationShapes(annotations, drawing(annotations, scale), frame)
}
const measure = (text: string) => ({ widthEm: 0.5 * text.length, heightEm: 0.74, depthEm: 0.21 })

describe("annotations", () => {
  test("text stands at data or at shares of the frame, from the lower left", () => {
    const { over } = shapesOf([
      { type: "text", text: "a", at: { x: 10, y: 10 } },
      { type: "text", text: "b", at: { x: 0.25, y: 0.9, in: "frame" } },
    ])
    expect(over).toMatchObject([
      { x: 100, y: 50 },
      { x: 50, y: expect.closeTo(10, 9) },
    ])
  })

  test("a span lies under the data, cut at the frame, in an opaque tint", () => {
    const { under, over } = shapesOf([{ type: "span", axis: "x", from: 10, to: 1e6, label: "late" }])
    // A quarter of #999999 on white: 255 - (255 - 153) / 4.
    expect(under).toMatchObject([{ d: "M100,0H200V100H100Z", fill: "#e6e6e6" }])
    expect(over).toMatchObject([{ text: "late" }])
  })

  test("an arrow ends in a filled head at its tip", () => {
    const [shaft, head] = shapesOf([{ type: "arrow", from: { x: 1, y: 1 }, to: { x: 100, y: 1 } }]).over
    expect(shaft).toMatchObject({ fill: null, stroke: "#000000" })
    expect(head).toMatchObject({ fill: "#000000", stroke: null, d: expect.stringMatching(/^M200,100L/) })
  })

  test("a triangle has the slope of its law, on logarithmic axes only", () => {
    const triangle = [{ type: "slope-triangle", at: { x: 1, y: 10 }, exponent: -0.5, decades: 1 }]
    const [path, label] = shapesOf(triangle).over
    // One decade is 100 pt wide and 50 pt high: half a decade down is 25 pt.
    expect(path).toMatchObject({ d: "M0,50L100,75L100,50Z" })
    expect(label).toMatchObject({ text: "$-1/2$" })
    expect(shapesOf(triangle, "linear").over).toEqual([])
  })

  test("what a logarithmic axis cannot show has no place", () => {
    expect(shapesOf([{ type: "text", text: "a", at: { x: -1, y: 1 } }]).over).toEqual([])
    expect(shapesOf([{ type: "line", from: { x: 0, y: 1 }, to: { x: 10, y: 1 } }]).over).toEqual([])
  })

  test("the legend keeps clear of them", () => {
    const corner = {
      type: "text",
      text: "here",
      at: { x: 1, y: 1, in: "frame" },
      align: "right",
      baseline: "top",
    }
    const legendAt = (annotations: readonly Annotation[]) =>
      insideShapes(drawing(annotations), frame, [], measure, { legend: true, taken: [] }).shapes.find(
        (shape) => shape.type === "text" && shape.text === "a",
      )
    const free = legendAt([])
    const pushed = legendAt(schema.parse([corner]))
    expect(free).toMatchObject({ y: expect.any(Number) })
    expect(pushed).not.toMatchObject({ x: (free as { x: number }).x, y: (free as { y: number }).y })
  })

  test.each([
    [{ type: "text", text: "a", at: { x: 1, y: 1 }, color: "url(x)" }],
    [{ type: "text", text: "a\u0001", at: { x: 1, y: 1 } }],
    [{ type: "image", href: "x" }],
  ])("%j is refused", (annotation) => expect(schema.safeParse([annotation]).success).toBe(false))
})
