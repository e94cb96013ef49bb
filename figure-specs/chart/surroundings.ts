import { axisTexts, frameShape } from "./axis-shapes"
import { colorBarShapes, colorBarTexts } from "./color-bar-shapes"
import type { Frame, PanelDrawing } from "./drawing"
import { textBounds, type MeasureLabel, type Shape, type TextShape } from "./shape"

/** Room that a panel needs outside its frame, in points. */
export interface Margins {
  readonly left: number
  readonly top: number
  readonly right: number
  readonly bottom: number
}

/** Numbers and titles around a frame. */
export function surroundingTexts(
  drawing: PanelDrawing,
  frame: Frame,
  measure: MeasureLabel,
): readonly TextShape[] {
  const { x, y, top } = drawing.axes
  return [
    ...axisTexts(x, "bottom", frame, frame.look, measure),
    ...axisTexts(y, "left", frame, frame.look, measure),
    ...(top ? axisTexts(top, "top", frame, frame.look, measure) : []),
    ...(drawing.colorBar ? colorBarTexts(drawing.colorBar, frame, measure) : []),
  ]
}

/** The frame with its ticks, and the colour bar beside it. */
export function frameShapes(drawing: PanelDrawing, frame: Frame): readonly Shape[] {
  const bar = drawing.colorBar ? colorBarShapes(drawing.colorBar, frame) : []
  return [frameShape(drawing.axes, frame, frame.look), ...bar]
}

/** How far those texts, and half the frame's line, stick out of the frame. */
export function marginsOf(texts: readonly TextShape[], frame: Frame, measure: MeasureLabel): Margins {
  const line = frame.look.frameWidthPt / 2
  const box = textBounds(texts, measure)
  if (!box) return { left: line, top: line, right: line, bottom: line }
  return {
    left: Math.max(line, -box.left),
    top: Math.max(line, -box.top),
    right: Math.max(line, box.right - frame.widthPt),
    bottom: Math.max(line, box.bottom - frame.heightPt),
  }
}
