import { describe, expect, test } from "vitest"
import { handMadeResult } from "@tests/support/hand-made-result"
import { figureSpec } from "@specs/figure-spec"
import { decayPanel, exampleFigure } from "@tests/support/example-figure"
import { parseTransform } from "../svg/matrix"
import { parseSvg, type SvgElement } from "../svg/parse-svg"
import { readDrawing } from "../svg/read-drawing"
import { renderFigure } from "./render-figure"

/** Frames of a drawing on the page: paths that begin as a frame does, moved as their panel is. */
function framesOf(svg: string) {
  const { outer } = readDrawing(svg)
  return outer.children.flatMap((panel) =>
    panel.children.flatMap((child) => {
      const [, width, height] = /^M0,0H([\d.]+)V([\d.]+)H0Z/.exec(child.attributes["d"] ?? "") ?? []
      if (!width || child.attributes["fill"] !== "none") return []
      const [, , , , x, y] = parseTransform(panel.attributes["transform"])
      return [{ x, y, width: Number(width), height: Number(height) }]
    }),
  )
}

const all = (elements: readonly SvgElement[]): readonly SvgElement[] =>
  elements.flatMap((element) => [element, ...all(element.children)])

const single = (changes: object = {}, size = { widthMm: 86, heightMm: 64 }) =>
  figureSpec.parse({ version: 1, size, panels: [decayPanel(changes)] })

describe("a figure", () => {
  test("has exactly the size of its spec and states it in millimetres and points", async () => {
    const { svg } = await renderFigure(single(), [handMadeResult(1)])
    const { outer, widthMm, heightMm } = readDrawing(svg)
    expect([widthMm, heightMm]).toEqual([86, 64])
    // 86 mm and 64 mm in points of 1/72 inch.
    expect(outer.attributes["viewBox"]).toBe("0 0 243.78 181.417")
  })

  test("carries its title, its description and its fonts, and nothing that loads or links", async () => {
    const { spec, results } = exampleFigure()
    const { svg, alternativeText, notes } = await renderFigure(spec, results)
    const { title, description, outer } = readDrawing(svg)
    expect(title).toBe("Density decay")
    expect(description).toBe(alternativeText)
    expect(alternativeText).toMatch(/^\(a\) Mean of n .* \(b\) Mean of n /)
    expect(notes[0]).toMatch(/^\(a\) Markers and error bars stand at /)
    expect(svg).toContain('@font-face{font-family:"Arimo"')
    for (const { name, attributes } of all(outer.children)) {
      expect(["script", "a", "foreignObject", "use"]).not.toContain(name)
      for (const [key, value] of Object.entries(attributes)) {
        expect(key).not.toMatch(/^on|href$/)
        expect(value).not.toMatch(/url\((?!#panel-)/)
      }
    }
    expect(svg.match(/url\((?!#panel-|data:font\/woff2;base64,)/)).toBeNull()
  })

  test("fills the page to its rim with labels and lets none stick out", async () => {
    const { spec, results } = exampleFigure()
    const { svg } = await renderFigure(spec, results)
    const [first, second] = framesOf(svg)
    expect(first!.y).toBeCloseTo(second!.y, 3)
    expect(first!.height).toBeCloseTo(second!.height, 3)
    expect(first!.width).toBeCloseTo(second!.width, 3)
    expect(second!.x + second!.width).toBeLessThan((178 * 72) / 25.4)
  })

  test("frames of a grid align to a tenth of a point, whatever their labels", async () => {
    const places = [1, 2].flatMap((row) => [1, 2].map((column) => ({ row, column })))
    const panels = places.map((place, index) =>
      decayPanel({
        place,
        axes: index === 3 ? { y: { scale: "linear", label: "A much longer title $n(t)$" } } : {},
      }),
    )
    const spec = figureSpec.parse({
      version: 1,
      size: { widthMm: 178, heightMm: 120 },
      grid: { rows: 2, columns: 2 },
      panels,
    })
    const results = [handMadeResult(1), handMadeResult(3), handMadeResult(3, 20), handMadeResult(3)]
    const [a, b, c, d] = framesOf((await renderFigure(spec, results)).svg)
    expect(Math.abs(a!.x - c!.x)).toBeLessThan(0.1)
    expect(Math.abs(b!.x - d!.x)).toBeLessThan(0.1)
    expect(Math.abs(a!.y - b!.y)).toBeLessThan(0.1)
    expect(new Set([a, b, c, d].map((frame) => frame!.width.toFixed(1))).size).toBe(1)
  })

  test("shared axes have one domain and one set of numbers", async () => {
    const panels = [1, 2].map((row) => decayPanel({ place: { row, column: 1 } }))
    const grid = { rows: 2, columns: 1 }
    const at = async (shareX: boolean) => {
      const size = { widthMm: 86, heightMm: 110 }
      const spec = figureSpec.parse({ version: 1, size, grid: { ...grid, shareX }, panels })
      const { svg } = await renderFigure(spec, [handMadeResult(1), handMadeResult(3)])
      return all(parseSvg(svg)).filter(({ name, text }) => name === "text" && text === "10").length
    }
    // Five decades of time are numbered once instead of twice.
    expect((await at(false)) - (await at(true))).toBe(5)
  })

  test("a legend that two panels have in common is set once", async () => {
    const { spec } = exampleFigure({
      panels: [decayPanel(), decayPanel({ place: { row: 1, column: 2 } })],
    })
    const { svg } = await renderFigure(spec, [handMadeResult(3), handMadeResult(3)])
    expect(all(parseSvg(svg)).filter(({ text }) => text === "fit")).toHaveLength(1)
  })

  test("the serif face is used throughout when the look asks for it", async () => {
    const { svg } = await renderFigure(single(), [handMadeResult(1)], {
      look: { fontFamily: "STIX Two Text" },
    })
    const families = all(parseSvg(svg)).flatMap(({ attributes }) => attributes["font-family"] ?? [])
    expect(new Set(families)).toEqual(new Set(["STIX Two Text,Times New Roman,Times,serif"]))
  })

  test("the same figure drawn at the same time twice is the same", async () => {
    const { spec, results } = exampleFigure()
    const [one, two] = await Promise.all([renderFigure(spec, results), renderFigure(spec, results)])
    expect(one.svg).toBe(two.svg)
  })
})

describe("a figure that cannot be drawn says why and where", () => {
  test.each([
    [{ axes: { x: { label: "a $\\frac{$" } } }, "/panels/0/axes/x/label", "tex-invalid"],
    [{ references: [{ exponent: -1, label: "$t" }] }, "/panels/0/references/0/label", "dollar-unclosed"],
    [{ title: "\\$ 漢" }, "/panels/0/title", "glyph-missing"],
    [{ place: { row: 2, column: 1 } }, "/panels/0/place", "place-outside"],
  ])("%j", async (changes, pointer, code) => {
    await expect(renderFigure(single(changes), [handMadeResult(1)])).rejects.toMatchObject({
      name: "SpecError",
      issues: [{ pointer, code }],
    })
  })

  test("too small for its labels", async () => {
    const spec = single({}, { widthMm: 20, heightMm: 15 })
    await expect(renderFigure(spec, [handMadeResult(1)])).rejects.toMatchObject({
      issues: [{ pointer: "/size", code: "figure-too-small" }],
    })
  })

  test("a title longer than the page", async () => {
    const spec = single({ axes: { x: { label: "a very long title ".repeat(8) }, y: {} } })
    await expect(renderFigure(spec, [handMadeResult(1)])).rejects.toMatchObject({
      issues: [{ pointer: "/panels/0/axes/x/label", code: "label-too-long" }],
    })
  })

  test("two panels in one place", async () => {
    const { spec } = exampleFigure({ panels: [decayPanel(), decayPanel()] })
    await expect(renderFigure(spec, [handMadeResult(1), handMadeResult(1)])).rejects.toMatchObject({
      issues: [{ pointer: "/panels/1/place", code: "place-taken" }],
    })
  })
})
