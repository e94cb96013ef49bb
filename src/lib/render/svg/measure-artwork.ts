import type { FontFamily } from "@specs/chart/drawing"
import { pointsPerMm } from "../figure/outer-svg"
import { compose, identity, parseTransform, scaleOfMatrix, type Matrix } from "./matrix"
import { readText } from "./outline-text"
import type { SvgElement } from "./parse-svg"
import { readDrawing } from "./read-drawing"
import { readImage } from "./walk-drawing"
import { findFace, openFont } from "../typeset/fonts"

/** What a drawing really is, for comparison with what a journal asks for. Sizes on paper. */
export interface ArtworkMeasures {
  readonly widthMm: number
  readonly heightMm: number
  /** Size of type of the smallest text, sub- and superscripts left out; null without text. */
  readonly smallestTextPt: number | null
  readonly largestTextPt: number | null
  /** Size of type of the smallest sub- or superscript. */
  readonly smallestScriptPt: number | null
  readonly thinnestLinePt: number | null
  /** Families of the text, in alphabetical order. */
  readonly fonts: readonly string[]
  /** Whether mathematics is drawn as shapes. */
  readonly mathematics: boolean
  /** Pixels an inch of the coarsest image inside; null without images. */
  readonly rasterDpi: number | null
  /** Whether anything is drawn see-through, which EPS mixes with white. */
  readonly transparency: boolean
}

interface Findings {
  readonly text: number[]
  readonly scripts: number[]
  readonly lines: number[]
  readonly dpi: number[]
  readonly fonts: Set<string>
  mathematics: boolean
  transparency: boolean
}

function visit(element: SvgElement, around: Matrix, strokeAround: string | undefined, found: Findings): void {
  const { name, attributes } = element
  if (["title", "desc", "style", "defs"].includes(name)) return
  const matrix = compose(around, parseTransform(attributes["transform"]))
  const scale = scaleOfMatrix(matrix)
  const stroke = attributes["stroke"] ?? strokeAround
  if (attributes["class"] === "math") {
    // Set in thousandths of an em; sub- and superscripts inside are smaller by the typesetter's own rules.
    found.mathematics = true
    found.text.push(1000 * scale)
    return
  }
  if (name === "text") {
    const { family, sizePt } = readText(element)
    found.fonts.add(family)
    ;(attributes["class"] === "script" ? found.scripts : found.text).push(sizePt * scale)
  }
  if (name === "image") {
    const { png, width, height } = readImage(element)
    // Width and height of a PNG stand at bytes 16 and 20. A scale of colours, one pixel wide, is not a picture.
    const [across, down] = [png.readUInt32BE(16), png.readUInt32BE(20)]
    if (across > 1) found.dpi.push((72 * across) / (width * scale), (72 * down) / (height * scale))
  }
  const drawn = stroke !== undefined && stroke !== "none" && ["path", "line", "rect"].includes(name)
  if (drawn) found.lines.push(Number(attributes["stroke-width"] ?? 1) * scale)
  for (const key of ["fill-opacity", "stroke-opacity", "opacity"])
    if (attributes[key] !== undefined && Number(attributes[key]) < 1) found.transparency = true
  for (const child of element.children) visit(child, matrix, stroke, found)
}

const least = (values: readonly number[]) => (values.length > 0 ? round(Math.min(...values)) : null)
const most = (values: readonly number[]) => (values.length > 0 ? round(Math.max(...values)) : null)
const round = (value: number) => Math.round(value * 1000) / 1000

/** Measures a drawing made by renderFigure by reading it, not by asking what was wished for. */
export function measureArtwork(svg: string): ArtworkMeasures {
  const { outer, widthMm, heightMm, scale } = readDrawing(svg)
  const found: Findings = {
    text: [],
    scripts: [],
    lines: [],
    dpi: [],
    fonts: new Set(),
    mathematics: false,
    transparency: false,
  }
  const page: Matrix = [scale, 0, 0, scale, 0, 0]
  for (const child of outer.children) visit(child, compose(page, identity), undefined, found)
  return {
    widthMm: round(widthMm),
    heightMm: round(heightMm),
    smallestTextPt: least(found.text),
    largestTextPt: most(found.text),
    smallestScriptPt: least(found.scripts),
    thinnestLinePt: least(found.lines),
    fonts: [...found.fonts].sort(),
    mathematics: found.mathematics,
    rasterDpi: least(found.dpi),
    transparency: found.transparency,
  }
}

/** Height of a capital, such as that of an axis title, in millimetres: what some journals ask for instead of type size. */
export function capitalHeightMm(sizePt: number, family: FontFamily = "Arimo"): number {
  const { capHeight, unitsPerEm } = openFont(findFace(family, false, false)!)
  return ((capHeight / unitsPerEm) * sizePt) / pointsPerMm
}
