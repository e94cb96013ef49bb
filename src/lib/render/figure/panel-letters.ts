import { inkIn, type Ink } from "@specs/chart/free-place"
import {
  boundsOf,
  textCorners,
  type Box,
  type MeasureLabel,
  type Shape,
  type TextShape,
} from "@specs/chart/shape"
import type { Frame, Look } from "@specs/chart/drawing"
import { isGridPanel, type Panel } from "./panel-places"

/** The letter of each panel as it is written, in reading order of the grid; empty for none. A lone panel has none. */
export function panelLetters(panels: readonly Panel[], look: Look): readonly string[] {
  const reading = panels
    .filter(isGridPanel)
    .sort((a, b) => a.place.row - b.place.row || a.place.column - b.place.column)
  return panels.map((panel) => {
    if (!isGridPanel(panel)) return ""
    const own = panel.letter ?? (reading.length > 1 ? String.fromCharCode(97 + reading.indexOf(panel)) : "")
    if (own === "" || /[^A-Za-z]/.test(own)) return own
    return look.letter.style === "(a)" ? `(${own})` : look.letter.style === "A" ? own.toUpperCase() : own
  })
}

export interface LetteredPanel {
  readonly letter: string
  readonly frame: Frame
  readonly ink: Ink
  /** Whether the frame is filled with an image, on which type is hard to read. */
  readonly filled: boolean
}

type Corner = "top-left" | "top-right" | "bottom-left" | "bottom-right"
const corners: readonly Corner[] = ["top-left", "top-right", "bottom-left", "bottom-right"]

function letterAt(
  corner: Corner,
  { letter, frame }: LetteredPanel,
  measure: MeasureLabel,
): { text: TextShape; box: Box } {
  const { look, widthPt, heightPt } = frame
  const inset = look.tickLengthPt + 0.3 * look.fontPt
  const right = corner.endsWith("right")
  const bottom = corner.startsWith("bottom")
  const text: TextShape = {
    type: "text",
    text: letter,
    x: right ? widthPt - inset : inset,
    y: bottom ? heightPt - inset : inset,
    align: right ? "right" : "left",
    baseline: bottom ? "bottom" : "top",
    angle: 0,
    fontPt: look.fontPt,
    color: "#000000",
    bold: look.letter.bold,
  }
  return { text, box: boundsOf(textCorners(text, measure(letter, look.letter.bold))) }
}

/**
 * Letters inside the frames, all in the same corner: the first of the four that is free in every panel. Where none is,
 * or on an image, a letter stands on a patch of paper in the top left.
 *
 * @returns shapes of each panel and the box that they take
 */
export function letterShapes(
  panels: readonly LetteredPanel[],
  measure: MeasureLabel,
): readonly { readonly shapes: readonly Shape[]; readonly box: Box | null }[] {
  const lettered = panels.filter(({ letter }) => letter !== "")
  const free = (corner: Corner) =>
    lettered.every((panel) => {
      const { left, top, right, bottom } = letterAt(corner, panel, measure).box
      return inkIn(panel.ink, { left: left - 2, top: top - 2, right: right + 2, bottom: bottom + 2 }) === 0
    })
  const corner = corners.find(free)
  return panels.map((panel) => {
    if (panel.letter === "") return { shapes: [], box: null }
    const { text, box } = letterAt(corner ?? "top-left", panel, measure)
    if (corner && !panel.filled) return { shapes: [text], box }
    const [left, top, right, bottom] = [box.left - 1.5, box.top - 1.5, box.right + 1.5, box.bottom + 1]
    const d = `M${left},${top}H${right}V${bottom}H${left}Z`
    return { shapes: [{ type: "path", d, fill: "#ffffff", stroke: null, widthPt: 0 }, text], box }
  })
}
