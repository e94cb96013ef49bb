import type { FontFamily } from "@specs/chart/drawing"
import { labelParts } from "@specs/chart/label-parts"
import type { LabelSize } from "@specs/chart/shape"

/** A formula as paths: sizes in em, `body` in thousandths of an em with the baseline at y = 0. */
export interface MathBox {
  readonly w: number
  readonly h: number
  readonly d: number
  readonly body: string
}

/** A stretch of a label; places and sizes in em of the label. */
export type Run =
  | {
      readonly type: "text"
      readonly text: string
      readonly x: number
      readonly scale: number
      readonly rise: number
    }
  | { readonly type: "math"; readonly body: string; readonly x: number }

export interface SetRuns extends LabelSize {
  readonly runs: readonly Run[]
}

/** Height and depth of a line of type, as in the proof. */
const lineHeightEm = 0.74
const lineDepthEm = 0.21

/** Text is measured large, because browsers round the advances of small type. */
const probePx = 200

let context: CanvasRenderingContext2D | null = null

function textWidthEm(text: string, family: FontFamily): number {
  context ??= document.createElement("canvas").getContext("2d")
  if (!context) throw new Error("This browser offers no canvas to measure text with.")
  context.font = `${probePx}px "${family}"`
  return context.measureText(text).width / probePx
}

/** Sets a label with formulas that the server has set; a formula that is missing stands as its source. */
export function setRuns(label: string, boxes: ReadonlyMap<string, MathBox>, family: FontFamily): SetRuns {
  const runs: Run[] = []
  let x = 0
  let heightEm = lineHeightEm
  let depthEm = lineDepthEm
  for (const part of labelParts(label)) {
    const box = part.type === "math" ? boxes.get(part.tex) : undefined
    if (box) {
      runs.push({ type: "math", body: box.body, x })
      x += box.w
      heightEm = Math.max(heightEm, box.h)
      depthEm = Math.max(depthEm, box.d)
      continue
    }
    const { text, scale, rise } =
      part.type === "math" ? { text: part.tex, scale: 1, rise: 0 } : { ...part, rise: part.riseEm }
    runs.push({ type: "text", text, x, scale, rise })
    x += scale * textWidthEm(text, family)
    heightEm = Math.max(heightEm, rise + scale * lineHeightEm)
  }
  return { runs, widthEm: x, heightEm, depthEm }
}

/** Sets labels and remembers what it has set; `missing` lists the formulas that it met and has no box for. */
export function labelSetter(
  boxes: ReadonlyMap<string, MathBox>,
  family: FontFamily,
): { readonly set: (label: string) => SetRuns; readonly missing: () => readonly string[] } {
  const known = new Map<string, SetRuns>()
  const set = (label: string): SetRuns => {
    let runs = known.get(label)
    if (!runs) known.set(label, (runs = setRuns(label, boxes, family)))
    return runs
  }
  const missing = () => {
    const parts = [...known.keys()].flatMap(labelParts)
    return [
      ...new Set(parts.flatMap((part) => (part.type === "math" && !boxes.has(part.tex) ? [part.tex] : []))),
    ]
  }
  return { set, missing }
}
