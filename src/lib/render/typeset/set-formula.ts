import { parseSvg, writeSvg, type SvgElement } from "../svg/parse-svg"
import { LabelError } from "@specs/chart/label-error"
import { texEngine, type TexEngine } from "./tex-engine"
import { checkTex } from "./tex-guard"

/** A formula as paths: sizes in em; `body` in thousandths of an em with the baseline at y = 0, y downwards. */
export interface MathBox {
  readonly w: number
  readonly h: number
  readonly d: number
  readonly body: string
}

const widestEm = 60
const tallestEm = 8

/** What may remain of a formula: shapes, their geometry, nothing that names, links or scripts. */
const geometry: Record<string, readonly string[]> = {
  g: ["transform"],
  path: ["d", "transform"],
  rect: ["x", "y", "width", "height", "transform", "fill", "stroke", "stroke-width"],
  line: ["x1", "y1", "x2", "y2", "stroke", "stroke-width", "stroke-dasharray", "transform"],
  polygon: ["points", "transform"],
  ellipse: ["cx", "cy", "rx", "ry", "fill", "stroke", "stroke-width"],
  svg: ["x", "y", "width", "height", "viewBox"],
}

/** Keeps shapes and geometry, drops everything else, and unwraps groups that do nothing. */
function purify(element: SvgElement): readonly SvgElement[] {
  const allowed = geometry[element.name]
  if (!allowed)
    throw new LabelError("glyph-missing", "A character of this formula is not in the mathematics font.", 1)
  const attributes: Record<string, string> = {}
  for (const key of allowed) {
    const value = element.attributes[key]
    if (value !== undefined && /^[\w\s.,()+-]*$/.test(value)) attributes[key] = value
  }
  // Lines of \cancel and frames inherit a stroke that the dropped outer group carried.
  if (element.name === "line" || attributes["stroke-width"]) attributes["stroke"] = "currentColor"
  if (element.attributes["fill"] === "none") attributes["fill"] = "none"
  const children = element.children.flatMap(purify)
  if (element.name !== "g") return [{ ...element, attributes, children, text: "" }]
  if (children.length === 0) return []
  return Object.keys(attributes).length === 0 ? children : [{ ...element, attributes, children, text: "" }]
}

function setWith(engine: TexEngine, tex: string): MathBox {
  checkTex(tex)
  let raw
  try {
    raw = engine(tex)
  } catch (error) {
    throw new LabelError("tex-invalid", `${(error as Error).message}.`.replace("..", "."), 1)
  }
  if (!raw.viewBox)
    throw new LabelError("tex-invalid", "A label has one line: alignment is not available.", 1)
  const [, top, width, height] = raw.viewBox.split(/\s+/).map((value) => Number(value) / 1000) as [
    number,
    number,
    number,
    number,
  ]
  if (width > widestEm || height > tallestEm)
    throw new LabelError("tex-too-large", `A formula may be ${widestEm} em wide and ${tallestEm} em tall.`, 1)
  const body = writeSvg(parseSvg(raw.body).flatMap(purify))
  if (body === "") throw new LabelError("tex-invalid", "There is nothing between the dollar signs.", 1)
  const em = (value: number) => Math.round(value * 1e4) / 1e4
  return { w: em(width), h: em(-top), d: em(height + top), body }
}

/** Sets formulas; synchronous once the engine runs. Formulas that were set once are remembered. */
export type FormulaSetter = (tex: string) => MathBox

const remembered = 4000
let setter: Promise<FormulaSetter> | undefined

async function startSetter(): Promise<FormulaSetter> {
  const engine = await texEngine()
  const known = new Map<string, MathBox>()
  return (tex) => {
    const source = tex.trim()
    const hit = known.get(source)
    if (hit) return hit
    const box = setWith(engine, source)
    if (known.size >= remembered) known.clear()
    known.set(source, box)
    return box
  }
}

/** The process's formula setter; the first call starts the TeX engine. */
export const formulaSetter = (): Promise<FormulaSetter> => (setter ??= startSetter())
