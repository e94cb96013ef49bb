import sharp from "sharp"
import { describe, expect, test } from "vitest"
import { exampleFigure } from "@tests/support/example-figure"
import { renderFigure } from "../figure/render-figure"
import { pngAsSeen } from "../formats/color-vision-png"
import { svgToPng } from "../formats/raster"
import { findFace, openFont } from "../typeset/fonts"
import { applyTo, parseTransform } from "./matrix"
import { capitalHeightMm, measureArtwork } from "./measure-artwork"
import { parseSvg, writeSvg } from "./parse-svg"

describe("reading SVG", () => {
  test("what is written is read back", () => {
    const source = '<g transform="translate(1,2)"><text x="1">a &lt; b &amp; “c”</text><path d="M0,0"/></g>'
    expect(writeSvg(parseSvg(source))).toBe(source)
    expect(parseSvg("<t>&#x3b1;&#946;</t>")[0]!.text).toBe("αβ")
  })

  test.each(["<g><path/>", "<g></path>", "</g>", "<g a='1'/>", "<![CDATA[x]]>", "<!DOCTYPE svg><svg/>"])(
    "%s is refused",
    (source) => expect(() => parseSvg(source)).toThrow("SVG:"),
  )

  test("transforms apply from right to left", () => {
    // (1, 0) scaled to (2, 0), turned to (0, 2), moved to (10, 2).
    const [x, y] = applyTo(parseTransform("translate(10,0) rotate(90) scale(2)"), 1, 0)
    expect([x, y]).toEqual([expect.closeTo(10, 12), expect.closeTo(2, 12)])
    expect(() => parseTransform("skewX(3)")).toThrow("skewX")
  })
})

describe("measuring artwork", () => {
  test("reads sizes, type, lines and fonts from the drawing itself", async () => {
    const { spec, results } = exampleFigure()
    const look = { fontPt: 10, smallPt: 7, frameWidthPt: 0.4, errorWidthPt: 0.6 }
    const measures = measureArtwork((await renderFigure(spec, results, { look })).svg)
    expect(measures).toEqual({
      widthMm: 178,
      heightMm: 64,
      smallestTextPt: 7,
      largestTextPt: 10,
      // Superscripts are 0.7 of their numbers.
      smallestScriptPt: 4.9,
      thinnestLinePt: 0.4,
      fonts: ["Arimo"],
      mathematics: true,
      rasterDpi: null,
      transparency: false,
    })
  })

  test("scales count: a drawing printed at half its user units has half their sizes", () => {
    const half =
      '<svg width="10mm" height="10mm" viewBox="0 0 56.693 56.693"><g transform="scale(2)">' +
      '<text font-family="Arimo" font-size="6">a</text><path d="M0,0h1" stroke="#000000" stroke-width="0.3"/></g></svg>'
    const { smallestTextPt, thinnestLinePt } = measureArtwork(half)
    expect([smallestTextPt, thinnestLinePt]).toEqual([6, 0.3])
  })

  test("the height of capitals is that of the face's H", () => {
    const font = openFont(findFace("Arimo", false, false)!)
    const { bbox } = font.glyphForCodePoint("H".codePointAt(0)!)
    expect(capitalHeightMm(8)).toBeCloseTo((((8 * bbox.maxY) / font.unitsPerEm) * 25.4) / 72, 9)
  })
})

test("a proof as others see it keeps its size and resolution", async () => {
  const { spec, results } = exampleFigure()
  const png = await svgToPng((await renderFigure(spec, results)).svg, { dpi: 150 })
  const [before, after] = [await sharp(png).metadata(), await sharp(await pngAsSeen(png, "grey")).metadata()]
  expect([after.width, after.height, after.density]).toEqual([before.width, before.height, 150])
  const { data } = await sharp(await pngAsSeen(png, "grey"))
    .raw()
    .toBuffer({ resolveWithObject: true })
  for (let at = 0; at < data.length; at += 3 * 97) expect(data[at]).toBe(data[at + 1])
})
