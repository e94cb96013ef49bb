import type { Annotation, AnnotationPoint } from "../schema/annotations"
import type { Frame, PanelDrawing } from "./drawing"
import { exponentTex } from "./exponent-label"
import { framePositions, written, type FramePositions } from "./position"
import type { PathShape, Shape, TextShape } from "./shape"
import { tint } from "./tint"

interface Point {
  readonly x: number
  readonly y: number
}

type Place = (point: AnnotationPoint) => Point

const line = (from: Point, to: Point) =>
  `M${written(from.x)},${written(from.y)}L${written(to.x)},${written(to.y)}`

type Words = Pick<TextShape, "text" | "align" | "baseline" | "angle" | "color">

const textShape = (
  { x, y }: Point,
  { text, align, baseline, angle, color }: Words,
  fontPt: number,
): TextShape => ({ type: "text", text, x, y, align, baseline, angle, fontPt, color, bold: false })

/** A line, with a filled head at its end if it is an arrow; the line stops inside the head, so that the tip is sharp. */
function lineShapes(
  { type, from, to, dashed, color }: Extract<Annotation, { type: "line" | "arrow" }>,
  place: Place,
  { look }: Frame,
): readonly Shape[] {
  const [start, tip] = [place(from), place(to)]
  const length = Math.hypot(tip.x - start.x, tip.y - start.y)
  const head = type === "arrow" ? Math.min(5 * look.curveWidthPt + 1.5, length) : 0
  const [ux, uy] = length > 0 ? [(tip.x - start.x) / length, (tip.y - start.y) / length] : [0, 0]
  const neck = { x: tip.x - 0.8 * head * ux, y: tip.y - 0.8 * head * uy }
  const dash = dashed ? [4 * look.curveWidthPt, 2.4 * look.curveWidthPt] : []
  const shaft: PathShape = {
    type: "path",
    d: line(start, neck),
    fill: null,
    stroke: color,
    widthPt: look.curveWidthPt,
    dash,
  }
  if (type === "line") return [shaft]
  const corner = (side: number) => ({
    x: tip.x - head * ux - side * 0.38 * head * uy,
    y: tip.y - head * uy + side * 0.38 * head * ux,
  })
  const d = `${line(tip, corner(1))}L${written(corner(-1).x)},${written(corner(-1).y)}Z`
  return [shaft, { type: "path", d, fill: color, stroke: null, widthPt: 0 }]
}

/** A triangle with its legs horizontal and vertical, so that the slope can be read as rise over run. */
function triangleShapes(
  { at, exponent, decades, label, color }: Extract<Annotation, { type: "slope-triangle" }>,
  place: Place,
  positions: FramePositions,
  { look }: Frame,
): readonly Shape[] {
  const start = place(at)
  const run = decades * (positions.x(10) - positions.x(1))
  const rise = exponent * decades * (positions.y(10) - positions.y(1))
  const end = { x: start.x + run, y: start.y + rise }
  // The hypotenuse faces the data: a rising law's triangle sits below its curve, a falling one's above.
  const corner = { x: end.x, y: start.y }
  const d = `${line(start, end)}L${written(corner.x)},${written(corner.y)}Z`
  const middle = { x: corner.x + 2.5, y: (start.y + end.y) / 2 }
  const words = {
    text: label ?? `$${exponentTex(exponent)}$`,
    align: "left",
    baseline: "middle",
    angle: 0,
    color,
  } as const
  return [
    { type: "path", d, fill: null, stroke: color, widthPt: look.frameWidthPt },
    textShape(middle, words, look.smallPt),
  ]
}

function spanShape(
  { axis, from, to, color }: Extract<Annotation, { type: "span" }>,
  positions: FramePositions,
  { widthPt, heightPt }: Frame,
): PathShape {
  const limit = (value: number, most: number) => written(Math.min(most, Math.max(0, value)))
  const fill = tint(color, 0.25)
  const plain = { type: "path", fill, stroke: null, widthPt: 0 } as const
  if (axis === "x") {
    const [left, right] = [limit(positions.x(from), widthPt), limit(positions.x(to), widthPt)]
    return { ...plain, d: `M${left},0H${right}V${written(heightPt)}H${left}Z` }
  }
  const [low, high] = [limit(positions.y(from), heightPt), limit(positions.y(to), heightPt)]
  return { ...plain, d: `M0,${low}V${high}H${written(widthPt)}V${low}Z` }
}

/** The label of a span: at the upper end of a stretch of the abscissa, at the right end of one of the ordinate. */
function spanLabel(
  { axis, from, to, label }: Extract<Annotation, { type: "span" }>,
  positions: FramePositions,
  { widthPt, look }: Frame,
): readonly TextShape[] {
  if (!label) return []
  const inset = look.tickLengthPt + 2
  const words = { text: label, angle: 0, color: "#404040" }
  if (axis === "x") {
    const x = (positions.x(from) + positions.x(to)) / 2
    return [textShape({ x, y: inset }, { ...words, align: "center", baseline: "top" }, look.smallPt)]
  }
  const y = (positions.y(from) + positions.y(to)) / 2
  return [
    textShape({ x: widthPt - inset, y }, { ...words, align: "right", baseline: "middle" }, look.smallPt),
  ]
}

/** What the annotations of a panel draw: under its data and over them. */
export function annotationShapes(
  annotations: readonly Annotation[],
  drawing: PanelDrawing,
  frame: Frame,
): { readonly under: readonly Shape[]; readonly over: readonly Shape[] } {
  const { widthPt, heightPt, look } = frame
  const { x, y } = drawing.axes
  const positions = framePositions(x, y, widthPt, heightPt)
  const place: Place = (point) =>
    point.in === "frame"
      ? { x: point.x * widthPt, y: (1 - point.y) * heightPt }
      : { x: positions.x(point.x), y: positions.y(point.y) }
  const under: Shape[] = []
  const over: Shape[] = []
  for (const annotation of annotations) {
    if (annotation.type === "text") over.push(textShape(place(annotation.at), annotation, look.smallPt))
    else if (annotation.type === "span") {
      under.push(spanShape(annotation, positions, frame))
      over.push(...spanLabel(annotation, positions, frame))
    } else if (annotation.type === "slope-triangle") {
      if (x.scale === "log" && y.scale === "log")
        over.push(...triangleShapes(annotation, place, positions, frame))
    } else over.push(...lineShapes(annotation, place, frame))
  }
  return { under: under.filter(hasPlace), over: over.filter(hasPlace) }
}

/** A value that a logarithmic axis cannot show has no place, and neither has what stands at it. */
function hasPlace(shape: Shape): boolean {
  if (shape.type === "path") return !/NaN|Infinity/.test(shape.d)
  return Number.isFinite(shape.x + shape.y)
}
