import type { Frame, Look, PanelDrawing } from "./drawing"
import type { MeasureLabel, TextShape } from "./shape"
import { marginsOf, surroundingTexts, type Margins } from "./surroundings"

/** One panel in its place: the drawing, its frame, and what stands around it. */
export interface FittedPanel {
  readonly drawing: PanelDrawing
  readonly frame: Frame
  readonly margins: Margins
  readonly texts: readonly TextShape[]
}

const sides = ["left", "right", "top", "bottom"] as const

/** Whether margins stayed the same, to a hundredth of a point. */
export const sameMargins = (a: Margins, b: Margins): boolean =>
  sides.every((side) => Math.abs(a[side] - b[side]) < 0.01)

export const firstMargins: Margins = { left: 36, right: 6, top: 4, bottom: 28 }

/** Rounds after which margins that still change are taken as they are. */
export const mostRounds = 4

/**
 * Draws a panel as large as a given space allows. Margins follow from labels, labels from ticks, ticks from the frame:
 * a few rounds settle it.
 *
 * @param draw the kind's `build` for one result
 * @param space outer size in points
 * @param edge free space at the rim
 */
export function fitFrame(
  draw: (frame: Frame) => PanelDrawing,
  look: Look,
  space: { readonly width: number; readonly height: number },
  measure: MeasureLabel,
  edge: number,
): FittedPanel {
  let margins = firstMargins
  for (let round = 0; ; round += 1) {
    const frame = {
      widthPt: Math.max(20, space.width - margins.left - margins.right - 2 * edge),
      heightPt: Math.max(20, space.height - margins.top - margins.bottom - 2 * edge),
      look,
    }
    const drawing = draw(frame)
    const texts = surroundingTexts(drawing, frame, measure)
    const needed = marginsOf(texts, frame, measure)
    if (sameMargins(needed, margins) || round === mostRounds) return { drawing, frame, margins, texts }
    margins = needed
  }
}
