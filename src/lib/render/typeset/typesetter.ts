import type { FontFamily } from "@specs/chart/drawing"
import { LabelError } from "@specs/chart/label-error"
import type { MeasureLabel, TextShape } from "@specs/chart/shape"
import { escapeXml } from "../svg/parse-svg"
import { labelSvg } from "./label-svg"
import { formulaSetter, type MathBox } from "./set-formula"
import { setLabel, type SetLabel } from "./set-label"

/** Sets the labels of one figure in its face; synchronous, remembers what it has set. */
export interface Typesetter {
  readonly set: (text: string, bold: boolean) => SetLabel
  readonly measure: MeasureLabel
  readonly svg: (shape: TextShape) => string
}

/** Starts the TeX engine if need be and returns a typesetter for a face. */
export async function typesetterFor(family: FontFamily): Promise<Typesetter> {
  const formula = await formulaSetter()
  const known = new Map<string, SetLabel>()
  const set = (text: string, bold: boolean): SetLabel => {
    const key = `${bold ? "b" : "r"}${text}`
    let label = known.get(key)
    if (!label) known.set(key, (label = setLabel(text, formula, { family, bold })))
    return label
  }
  return { set, measure: set, svg: (shape) => labelSvg(shape, set(shape.text, shape.bold)) }
}

/**
 * Sets one label: text with TeX between dollar signs.
 *
 * @returns its size in em and its SVG with the baseline at the origin and one em = `fontPt` user units
 * @throws LabelError with the column of the label that cannot be set
 * @example await typesetLabel("Density $n(t)$", { fontPt: 9 })
 */
export async function typesetLabel(
  text: string,
  {
    family = "Arimo",
    bold = false,
    fontPt = 9,
    color = "#000000",
  }: {
    family?: FontFamily
    bold?: boolean
    fontPt?: number
    color?: string
  } = {},
): Promise<{ widthEm: number; heightEm: number; depthEm: number; svg: string }> {
  const setter = await typesetterFor(family)
  const { widthEm, heightEm, depthEm } = setter.set(text, bold)
  const shape = {
    type: "text",
    text,
    x: 0,
    y: 0,
    align: "left",
    baseline: "alphabetic",
    angle: 0,
    fontPt,
    color,
    bold,
  } as const
  return { widthEm, heightEm, depthEm, svg: setter.svg(shape) }
}

/** A formula for a page, or why it cannot be set. */
export type TypesetMath =
  | (MathBox & { readonly svg: string })
  | {
      readonly error: { readonly code: LabelError["code"]; readonly message: string; readonly column: number }
    }

/**
 * Sets one formula, without dollar signs, for use in a page: paths in the colour of the text around it.
 * Never throws for bad TeX: a page shows the source and the message.
 */
export async function typesetMath(tex: string): Promise<TypesetMath> {
  const formula = await formulaSetter()
  try {
    const box = formula(tex)
    const { w, h, d, body } = box
    const view = `viewBox="0 ${-1000 * h} ${1000 * w} ${1000 * (h + d)}"`
    const label = escapeXml(tex)
    const size = `width="${w}em" height="${h + d}em" style="vertical-align:${-d}em"`
    const open = `<svg xmlns="http://www.w3.org/2000/svg" role="img" aria-label="${label}" ${size} ${view} fill="currentColor">`
    return { ...box, svg: `${open}${body}</svg>` }
  } catch (error) {
    if (!(error instanceof LabelError)) throw error
    return { error: { code: error.code, message: error.message, column: error.column } }
  }
}
