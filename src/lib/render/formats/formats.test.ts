import { execFile } from "node:child_process"
import { createHash } from "node:crypto"
import path from "node:path"
import { promisify } from "node:util"
import { inflateSync } from "node:zlib"
import sharp from "sharp"
import { beforeAll, describe, expect, test } from "vitest"
import { exampleFigure } from "@tests/support/example-figure"
import { renderFigure } from "../figure/render-figure"
import { ascii85 } from "./ascii85"
import { svgToEps } from "./eps"
import { svgToPdf } from "./pdf"
import { svgToPng, svgToTiff } from "./raster"

const root = path.resolve(import.meta.dirname, "../../../..")
let svg = ""

beforeAll(async () => {
  const { spec, results } = exampleFigure()
  svg = (await renderFigure(spec, results)).svg
})

/** Everything that a PDF says, its compressed streams unpacked. */
function readPdf(bytes: Uint8Array): string {
  const source = Buffer.from(bytes).toString("latin1")
  return source.replace(/stream\n([\s\S]*?)\nendstream/g, (whole, data: string) => {
    try {
      return inflateSync(Buffer.from(data, "latin1")).toString("latin1")
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code?.startsWith("Z_")) return whole
      throw error
    }
  })
}

/** Values of the first directory of a little-endian TIFF: short numbers and fractions. @see TIFF 6.0, section 2 */
function tiffTags(bytes: Uint8Array): Map<number, number> {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const start = view.getUint32(4, true)
  const entries = Array.from({ length: view.getUint16(start, true) }, (_, k) => start + 2 + 12 * k)
  return new Map(
    entries.map((at) => {
      const place = view.getUint32(at + 8, true)
      const fraction = view.getUint16(at + 2, true) === 5
      const value = fraction
        ? view.getUint32(place, true) / view.getUint32(place + 4, true)
        : view.getUint16(at + 8, true)
      return [view.getUint16(at, true), value]
    }),
  )
}

describe("raster images", () => {
  // 178 mm and 64 mm at 300 pixels an inch are 2102.4 and 755.9 pixels.
  test("a PNG has the figure's pixels and says its resolution", async () => {
    const meta = await sharp(await svgToPng(svg, { dpi: 300 })).metadata()
    expect(meta).toMatchObject({ format: "png", width: 2102, height: 756, density: 300, hasAlpha: false })
  })

  test("a TIFF is compressed without loss and says its resolution", async () => {
    const tiff = await svgToTiff(svg, { dpi: 600 })
    expect(await sharp(tiff).metadata()).toMatchObject({ format: "tiff", width: 4205, density: 600 })
    // Tags of TIFF 6.0: 259 compression (5 is LZW), 282 and 283 resolution as a fraction, 296 its unit (2 is inch).
    const tags = tiffTags(tiff)
    expect([tags.get(259), tags.get(282), tags.get(283), tags.get(296)]).toEqual([5, 600, 600, 2])
  })

  test("text is drawn from our font files, not from those of the machine", async () => {
    const only = (inside: string) =>
      `<svg xmlns="http://www.w3.org/2000/svg" width="10mm" height="10mm" viewBox="0 0 28.346 28.346">${inside}</svg>`
    const png = await svgToPng(
      only('<text x="2" y="20" font-family="Arimo,Arial" font-size="20" fill="#000000">l</text>'),
      { dpi: 254 },
    )
    const { data, info } = await sharp(png).greyscale().raw().toBuffer({ resolveWithObject: true })
    const columns = Array.from({ length: info.width }, (_, x) =>
      Array.from({ length: info.height }, (_, y) => data[y * info.width + x]!).some((grey) => grey < 128),
    )
    // The stem of Arimo's l reaches from 138 to 318 of 2048 units: 20 pt at 3.528 pixels a point, from x = 2 pt on.
    expect(columns.indexOf(true)).toBe(Math.round((2 + (20 * 138) / 2048) * 3.528))
    expect(columns.lastIndexOf(true)).toBe(Math.round((2 + (20 * 318) / 2048) * 3.528) - 1)
  })
})

describe("PDF", () => {
  test("one page of exactly the figure's size with embedded fonts, real text and no clock", async () => {
    const pdf = readPdf(await svgToPdf(svg, { title: "Decay" }))
    // 178 mm and 64 mm in points.
    expect(pdf).toMatch(/\/MediaBox \[0 0 504\.56\d* 181\.41\d*\]/)
    expect(pdf.match(/\/Type \/Page\n/g)).toHaveLength(1)
    expect(pdf).toMatch(/\/FontFile2 \d+ 0 R/)
    expect(pdf).toMatch(/\/BaseFont \/[A-Z]{6}\+Arimo/)
    expect(pdf).toContain("/ToUnicode")
    expect(pdf.match(/\(D:\d{14}Z\)/g)).toEqual(["(D:19700101000000Z)", "(D:19700101000000Z)"])
    expect(pdf).not.toMatch(/\/Subtype \/Type3|\/JavaScript|\/URI/)
  })
})

describe("EPS", () => {
  test("states its bounding box, asks for no font and is plain ASCII", async () => {
    const eps = Buffer.from(await svgToEps(svg)).toString("latin1")
    expect(eps.startsWith("%!PS-Adobe-3.0 EPSF-3.0\n")).toBe(true)
    expect(eps).toContain("%%BoundingBox: 0 0 505 182\n")
    expect(eps).toContain("%%HiResBoundingBox: 0 0 504.5669 181.4173\n")
    expect(eps).not.toMatch(/findfont|[^\n\x20-\x7e]/)
  })

  test("base 85", () => {
    // "sure." in base 85, the closing example of the encoding's usual description; zeros are one z. (from memory)
    expect(ascii85(Buffer.from("sure."))).toBe("F*2M7/c~>")
    expect(ascii85(new Uint8Array(4))).toBe("z~>")
  })
})

test("another process draws the same bytes in every format", async () => {
  const run = promisify(execFile)
  const { stdout } = await run(process.execPath, ["--import", "tsx", "tests/support/draw-example.ts"], {
    cwd: root,
  })
  const digest = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest("hex")
  expect(JSON.parse(stdout)).toEqual({
    svg: digest(svg),
    png: digest(await svgToPng(svg, { dpi: 150 })),
    tiff: digest(await svgToTiff(svg, { dpi: 150 })),
    pdf: digest(await svgToPdf(svg)),
    eps: digest(await svgToEps(svg)),
  })
})

test("what a drawing does not contain is refused, not left out", async () => {
  const strange = svg.replace("</svg>", '<circle r="3"/></svg>')
  await expect(svgToPdf(strange)).rejects.toThrow("<circle>")
  await expect(svgToEps(strange)).rejects.toThrow("<circle>")
  const gradient = svg.replace("</svg>", '<path d="M0,0h1" fill="url(#g)"/></svg>')
  await expect(svgToPdf(gradient)).rejects.toThrow("url(#g)")
})
