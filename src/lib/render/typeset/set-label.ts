import type { FontFamily } from "@specs/chart/drawing"
import { fallbackFamily, findFace, openFont } from "./fonts"
import { labelParts } from "@specs/chart/label-parts"
import type { FormulaSetter, MathBox } from "./set-formula"
import { LabelError } from "@specs/chart/label-error"

/** A stretch of a label that is set in one go; positions and sizes in em. */
export type LabelRun =
  | {
      readonly type: "text"
      readonly text: string
      readonly family: string
      /** Size relative to the label's, and how far its baseline is raised. */
      readonly scale: number
      readonly rise: number
      readonly x: number
      readonly w: number
    }
  | {
      readonly type: "math"
      readonly tex: string
      readonly box: MathBox
      readonly x: number
      readonly w: number
    }

export interface SetLabel {
  readonly runs: readonly LabelRun[]
  readonly widthEm: number
  readonly heightEm: number
  readonly depthEm: number
  readonly bold: boolean
  readonly italic: boolean
}

/** Height and depth that a line of type has at least, so that rows of labels keep one height. */
const lineHeightEm = 0.74
const lineDepthEm = 0.21

const isGreek = (code: number) => (code >= 0x370 && code <= 0x3ff) || (code >= 0x1f00 && code <= 0x1fff)
const isLatin = (code: number) =>
  (code >= 0x41 && code <= 0x5a) || (code >= 0x61 && code <= 0x7a) || (code >= 0xc0 && code <= 0x24f)

interface Segment {
  readonly family: string
  text: string
}

/** Splits text where the face lacks a character and another font stands in. @throws LabelError glyph-missing */
function segmentsOf(text: string, family: FontFamily, bold: boolean, italic: boolean, at: number): Segment[] {
  const own = openFont(findFace(family, bold, italic)!)
  const fallback = openFont(findFace(fallbackFamily, false, false)!)
  const segments: Segment[] = []
  let place = at
  for (const character of text) {
    const code = character.codePointAt(0)!
    const used = own.hasGlyphForCodePoint(code) ? family : fallbackFamily
    if (used === fallbackFamily && !fallback.hasGlyphForCodePoint(code)) {
      const name = `U+${code.toString(16).toUpperCase().padStart(4, "0")}`
      throw new LabelError("glyph-missing", `The figure fonts have no “${character}” (${name}).`, place + 1)
    }
    const last = segments.at(-1)
    if (last?.family === used) last.text += character
    else segments.push({ family: used, text: character })
    place += character.length
  }
  return segments
}

/**
 * Splits text where Greek meets Latin. Browsers shape each script by itself, so no kerning crosses that border and the
 * widths of a font's own layout would be off by up to a quarter of an em.
 */
export function scriptRuns(text: string): readonly string[] {
  const runs: string[] = []
  let current: "greek" | "latin" | null = null
  for (const character of text) {
    const code = character.codePointAt(0)!
    const script = isGreek(code) ? "greek" : isLatin(code) ? "latin" : null
    if (runs.length > 0 && (script === null || current === null || script === current))
      runs[runs.length - 1] += character
    else {
      runs.push(character)
      current = null
    }
    current = script ?? current
  }
  return runs
}

/** Width of a text in em, by the font's own advances and kerning. */
export function advanceEm(text: string, family: string, bold: boolean, italic: boolean): number {
  const font = openFont(findFace(family, bold, italic)!)
  return scriptRuns(text).reduce((sum, run) => sum + font.layout(run).advanceWidth / font.unitsPerEm, 0)
}

/** Sets a formula of a label; its errors name their place in the label. */
function setFormula(formula: FormulaSetter, tex: string, at: number): MathBox {
  try {
    return formula(tex)
  } catch (error) {
    if (!(error instanceof LabelError)) throw error
    throw new LabelError(error.code, error.message, at + error.column)
  }
}

/**
 * Sets a label: text in the figure's face, TeX between dollar signs as paths.
 *
 * @throws LabelError with the column in the label at which it cannot be set
 */
export function setLabel(
  label: string,
  formula: FormulaSetter,
  { family, bold = false, italic = false }: { family: FontFamily; bold?: boolean; italic?: boolean },
): SetLabel {
  const runs: LabelRun[] = []
  let x = 0
  let height = lineHeightEm
  let depth = lineDepthEm
  for (const part of labelParts(label)) {
    if (part.type === "math") {
      const box = setFormula(formula, part.tex, part.at)
      runs.push({ type: "math", tex: part.tex, box, x, w: box.w })
      x += box.w
      height = Math.max(height, box.h)
      depth = Math.max(depth, box.d)
      continue
    }
    const { scale, riseEm: rise } = part
    height = Math.max(height, rise + scale * lineHeightEm)
    for (const segment of segmentsOf(part.text, family, bold, italic, part.at)) {
      const w = scale * advanceEm(segment.text, segment.family, bold, italic)
      runs.push({ type: "text", text: segment.text, family: segment.family, scale, rise, x, w })
      x += w
    }
  }
  return { runs, widthEm: x, heightEm: height, depthEm: depth, bold, italic }
}
