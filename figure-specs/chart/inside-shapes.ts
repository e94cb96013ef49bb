import type { Frame, FrameLabel, Legend, PanelDrawing } from "./drawing"
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

/** How far a box must move to lie inside a frame. */
function inwards({ left, top, right, bottom }: Box, { widthPt, heightPt }: Frame) {
  const along = (low: number, high: number, length: number) =>
    low < 1 ? 1 - low : high > length - 1 ? length - 1 - high : 0
  return { dx: along(left, right, widthPt), dy: along(top, bottom, heightPt) }
}

/** A label at the first of its places that covers the least ink; where none is inside the frame it is moved there. */
function placeLabel(label: FrameLabel, ink: Ink, frame: Frame, measure: MeasureLabel): TextShape | null {
  const { look } = frame
  const fontPt = label.small ? look.smallPt : look.fontPt
  let best: { text: TextShape; box: Box; cost: number } | undefined
  for (const place of label.places) {
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
    const { dx, dy } = inwards(box, frame)
    const cost = inkInside(ink, corners) + 1000 * Number(dx !== 0 || dy !== 0)
    if (!best || cost < best.cost) best = { text, box, cost }
  }
  if (!best || (label.optional && best.cost > 3)) return null
  const { dx, dy } = inwards(best.box, frame)
  return { ...best.text, x: best.text.x + dx, y: best.text.y + dy }
}

/** A legend at the freest place of the frame: in one column if that is clear of data, in two or three otherwise. */
function placeLegend(legend: Legend, ink: Ink, frame: Frame, measure: MeasureLabel) {
  const { look } = frame
  const inset = look.tickLengthPt + 0.35 * look.smallPt
  const tried = [1, 2, 3].map((columns) => {
    const size = legendShapes(legend, look, measure, { x: 0, y: 0 }, columns)
    return { columns, ...freePlace(ink, frame, size, inset) }
  })
  const best = tried.reduce((least, one) => (one.covered < least.covered ? one : least))
  return { ...legendShapes(legend, look, measure, best, best.columns), covered: best.covered }
}

export interface InsideShapes {
  readonly shapes: readonly Shape[]
  /** Whether the frame had no place for the legend that is free of data. */
  readonly legendCoversData: boolean
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
): InsideShapes {
  const shapes: Shape[] = [...annotationShapes(drawing.annotations ?? [], drawing, frame).over]
  const taken = [...ink, ...boxes.flatMap(boxInk), ...shapes.flatMap((shape) => shapeInk(shape, measure))]
  for (const label of drawing.labels) {
    const text = placeLabel(label, taken, frame, measure)
    if (!text) continue
    shapes.push(text)
    taken.push(...shapeInk(text, measure))
  }
  if (!withLegend || drawing.legend.entries.length === 0) return { shapes, legendCoversData: false }
  const legend = placeLegend(drawing.legend, taken, frame, measure)
  shapes.push(...legend.shapes)
  return { shapes, legendCoversData: legend.covered > 0 }
}
