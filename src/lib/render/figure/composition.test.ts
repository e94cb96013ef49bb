import { describe, expect, test } from "vitest"
import { axisOf } from "@specs/chart/axis"
import type { Frame, PanelDrawing } from "@specs/chart/drawing"
import { colorBarOf, heatImage, heatMark } from "@specs/chart/heat-map"
import { dataSet, panelSpec } from "@specs/chart/marks"
import { handMadeResult } from "@tests/support/hand-made-result"
import { figureSpec, type FigureSpecInput } from "@specs/figure-spec"
import { kindOf } from "@specs/kinds"
import { decayPanel } from "@tests/support/example-figure"
import { parseTransform } from "../svg/matrix"
import { measureArtwork } from "../svg/measure-artwork"
import type { SvgElement } from "../svg/parse-svg"
import { readDrawing } from "../svg/read-drawing"
import { renderFigure, type RenderOptions } from "./render-figure"

const figure = (changes: Partial<FigureSpecInput>) =>
  figureSpec.parse({ version: 1, size: { widthMm: 86, heightMm: 70 }, panels: [], ...changes })

/** Frames of a drawing, in the order in which they are drawn. */
function framesOf(svg: string) {
  return readDrawing(svg).outer.children.flatMap((panel) =>
    panel.children.flatMap((child) => {
      const [, width, height] = /^M0,0H([\d.]+)V([\d.]+)H0Z/.exec(child.attributes["d"] ?? "") ?? []
      if (!width || child.attributes["fill"] !== "none") return []
      const [, , , , x, y] = parseTransform(panel.attributes["transform"])
      return [{ x, y, right: x + Number(width), bottom: y + Number(height) }]
    }),
  )
}

const all = (elements: readonly SvgElement[]): readonly SvgElement[] =>
  elements.flatMap((element) => [element, ...all(element.children)])
const elementsOf = (svg: string) => all(readDrawing(svg).outer.children)

/** A map of 3 by 2 cells, with a second abscissa in other units. */
function mapDrawing(frame: Frame, withTop: boolean): PanelDrawing {
  const { look, widthPt, heightPt } = frame
  const across = { scale: "linear", direction: "horizontal", lengthPt: widthPt, look } as const
  const x = axisOf({ ...across, title: "$x$", domain: [0, 3] })
  const y = axisOf({ ...across, title: "$t$", domain: [0, 2], direction: "vertical", lengthPt: heightPt })
  const top = axisOf({ ...across, title: "$x/\\xi$", domain: [0, 30] })
  const scale = { scale: "linear", domain: [0, 5] } as const
  const url = heatImage({ values: [0, 1, 2, 3, 4, 5], columns: 3, rows: 2 }, scale, look, frame)
  return {
    spec: panelSpec({
      widthPt,
      heightPt,
      x,
      y,
      data: [dataSet("map", [{ url, x0: 0, x1: 3, y0: 0, y1: 2 }])],
      marks: [heatMark("map")],
    }),
    axes: withTop ? { x, y, top } : { x, y },
    legend: { title: null, entries: [] },
    labels: [],
    colorBar: colorBarOf("$\\rho$", scale, heightPt, look),
    filled: true,
    notes: [],
    alternativeText: "A map.",
  }
}
const mapKind =
  (withTop = false): NonNullable<RenderOptions["kindOf"]> =>
  () => ({ ...kindOf("decay-exponent"), build: (_result, _params, frame) => mapDrawing(frame, withTop) })

describe("insets", () => {
  const place = { inside: 1, x: 0.48, y: 0.5, width: 0.5, height: 0.48 }
  const spec = figure({ panels: [decayPanel(), decayPanel({ place, axes: { y: { scale: "linear" } } })] })
  const results = [handMadeResult(1), handMadeResult(1)]

  test("stand in their box inside the frame of their panel, with their labels", async () => {
    const { svg } = await renderFigure(spec, results)
    const [host, inset] = framesOf(svg)
    const width = host!.right - host!.x
    expect(inset!.x).toBeGreaterThan(host!.x + 0.48 * width)
    expect(inset!.right).toBeLessThan(host!.x + 0.98 * width)
    expect(inset!.bottom).toBeLessThan(host!.y + 0.5 * (host!.bottom - host!.y))
  })

  test("have no letter, leave their panel without one, and are described as insets", async () => {
    const { svg, alternativeText } = await renderFigure(spec, results)
    expect(elementsOf(svg).some(({ text }) => text === "(a)" || text === "(b)")).toBe(false)
    expect(alternativeText).toMatch(/^Mean of n .* Inset: Mean of n /)
  })

  test("that cover data of their panel are reported", async () => {
    const covering = figure({
      panels: [decayPanel(), decayPanel({ place: { inside: 1, x: 0.1, y: 0.2, width: 0.6, height: 0.6 } })],
    })
    expect((await renderFigure(spec, results)).warnings).toEqual([])
    expect((await renderFigure(covering, results)).warnings).toMatchObject([
      { pointer: "/panels/1/place", code: "inset-covers-data" },
    ])
  })

  test.each([
    [{ inside: 3, x: 0, y: 0, width: 0.5, height: 0.5 }, "place-outside"],
    [{ inside: 2, x: 0, y: 0, width: 0.5, height: 0.5 }, "place-nested"],
    [{ inside: 1, x: 0, y: 0, width: 0.2, height: 0.15 }, "figure-too-small"],
  ])("at %j: %s", async (at, code) => {
    const wrong = figure({ panels: [decayPanel(), decayPanel({ place: at })] })
    await expect(renderFigure(wrong, results)).rejects.toMatchObject({
      issues: [{ pointer: "/panels/1/place", code }],
    })
  })
})

describe("maps", () => {
  const one = figure({ panels: [decayPanel()] })

  test("are one image, sharp enough for print, beside a colour bar with its own numbers", async () => {
    const { svg } = await renderFigure(one, [handMadeResult(1)], { kindOf: mapKind() })
    const elements = elementsOf(svg)
    expect(elements.filter(({ name }) => name === "image")).toHaveLength(2)
    expect(measureArtwork(svg).rasterDpi).toBeGreaterThanOrEqual(600)
    const [frame] = framesOf(svg)
    // Room for bar, numbers and title at the right.
    expect((86 * 72) / 25.4 - frame!.right).toBeGreaterThan(30)
  })

  test("a second abscissa stands at the top", async () => {
    const without = framesOf((await renderFigure(one, [handMadeResult(1)], { kindOf: mapKind() })).svg)
    const with_ = framesOf((await renderFigure(one, [handMadeResult(1)], { kindOf: mapKind(true) })).svg)
    expect(with_[0]!.y).toBeGreaterThan(without[0]!.y + 15)
  })

  test("a colour bar that two panels of a row have in common stands beside the last", async () => {
    const row = figure({
      size: { widthMm: 178, heightMm: 60 },
      grid: { rows: 1, columns: 2 },
      panels: [decayPanel(), decayPanel({ place: { row: 1, column: 2 } })],
    })
    const { svg } = await renderFigure(row, [handMadeResult(1), handMadeResult(1)], { kindOf: mapKind() })
    expect(elementsOf(svg).filter(({ name }) => name === "image")).toHaveLength(3)
  })

  test("a letter on a map stands on paper", async () => {
    const lettered = figure({ panels: [decayPanel({ letter: "c" })] })
    const { svg } = await renderFigure(lettered, [handMadeResult(1)], { kindOf: mapKind() })
    const panel = readDrawing(svg).outer.children.find(({ name }) => name === "g")!
    const letter = panel.children.findIndex(({ children }) => children[0]?.text === "(c)")
    expect(panel.children[letter - 1]!.attributes["fill"]).toBe("#ffffff")
  })
})
