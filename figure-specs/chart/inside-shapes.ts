import type { Frame, FrameLabel, PanelDrawing } from "./drawing"
import { annotationShapes } from "./annotation-shapes"
import { freePlace, inkInside, type Ink } from "./free-place"
import { legendShapes } from "./legend-shapes"
import { pathInk } from "./scene-ink"
import { boundsOf, textCorners, type Box, type MeasureLabel, type Shape, type TextShape } from "./shape"

/** Points of ink along the edges and through the middle of a box, so that the next text keeps clear of it. */
function boxInk({ left, top, right, bottom }: Box): Ink {
  const points: [number, number][] = []
  for (let x = left; x <= right + 2; x += 2)
    for (let y = top; y <= bottom + 2; y += 2) points.push([Math.min(x, right), Math.min(y, bottom)])
  return points
}

/** Where a shape that already has its place puts ink. */
function shapeInk(shape: Shape, measure: MeasureLabel): Ink {
  if (shape.type === "path") return pathInk(shape.d)
  if (shape.type === "image") return []
  return boxInk(boundsOf(textCorners(shape, measure(shape.text, shape.bold))))
}

/** A label at the first of its places that covers the least ink and stays inside the frame. */
function placeLabel(label: FrameLabel, ink: Ink, { widthPt, heightPt, look }: Frame, measure: MeasureLabel) {
  let best: { text: TextShape; box: Box; cost: number } | undefined
  for (const place of label.places) {
    const fontPt = label.small ? look.smallPt : look.fontPt
    const text: TextShape = {
      type: "text",
      ...place,
      text: label.text,
      fontPt,
      color: label.color,
      bold: false,
    }
    const corners = textCorners(text, measure(label.text, false))
    const box = boundsOf(corners)
    const outside = box.left < 1 || box.top < 1 || box.right > widthPt - 1 || box.bottom > heightPt - 1
    const cost = inkInside(ink, corners) + (outside ? 1000 : 0)
    if (!best || cost < best.cost) best = { text, box, cost }
  }
  return best
}

/**
 * Annotations, labels and legend of a panel. Annotations stand where their author put them; labels and then the legend,
 * which is free to go anywhere, where they cover the least of what is drawn.
 *
 * @param options.legend false where a legend before this one says the same
 * @param options.taken boxes that hold something already, such as a panel letter
 */
export function insideShapes(
  drawing: PanelDrawing,
  frame: Frame,
  ink: Ink,
  measure: MeasureLabel,
  { legend: withLegend, taken: boxes }: { readonly legend: boolean; readonly taken: readonly Box[] },
): readonly Shape[] {
  const shapes: Shape[] = [...annotationShapes(drawing.annotations ?? [], drawing, frame).over]
  const taken = [...ink, ...boxes.flatMap(boxInk), ...shapes.flatMap((shape) => shapeInk(shape, measure))]
  for (const label of drawing.labels) {
    const placed = placeLabel(label, taken, frame, measure)
    if (!placed) continue
    shapes.push(placed.text)
    taken.push(...boxInk(placed.box))
  }
  if (!withLegend || drawing.legend.entries.length === 0) return shapes
  const legend = legendShapes(drawing.legend, frame.look, measure)
  const inset = frame.look.tickLengthPt + 0.35 * frame.look.smallPt
  const place = freePlace(taken, frame, legend, inset)
  return [...shapes, ...legendShapes(drawing.legend, frame.look, measure, place).shapes]
}
