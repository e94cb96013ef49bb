import type { AxisDrawing, Look, PanelDrawing } from "./drawing"
import { fractionAlong, written } from "./position"
import type { MeasureLabel, Shape, TextShape } from "./shape"

export const ink = "#000000"

/** Distances as shares of the type size, so that small type sits closer. */
const tickToLabel = 0.36
const labelToTitle = 0.34

export type Side = "bottom" | "left" | "top" | "right"

interface FrameSize {
  readonly widthPt: number
  readonly heightPt: number
}

const inside = (axis: AxisDrawing) => (value: number) => {
  const at = fractionAlong(axis, value)
  return at > 1e-6 && at < 1 - 1e-6
}

/** Ticks of one side as path commands, inwards; none at the very corners, where the frame is. */
function tickPath(axis: AxisDrawing, side: Side, { widthPt, heightPt }: FrameSize, look: Look): string {
  const marks = [
    ...axis.major.map(({ value }) => ({ value, length: look.tickLengthPt })),
    ...axis.minor.map((value) => ({ value, length: look.minorTickLengthPt })),
  ]
  return marks
    .filter(({ value }) => inside(axis)(value))
    .map(({ value, length }) => {
      const fraction = fractionAlong(axis, value)
      if (side === "bottom" || side === "top") {
        const x = written(widthPt * fraction)
        return side === "bottom" ? `M${x},${written(heightPt)}v${-length}` : `M${x},0v${length}`
      }
      const y = written(heightPt * (1 - fraction))
      return side === "left" ? `M0,${y}h${length}` : `M${written(widthPt)},${y}h${-length}`
    })
    .join("")
}

/** The frame and the ticks on its four sides as one path. */
export function frameShape(axes: PanelDrawing["axes"], size: FrameSize, look: Look): Shape {
  const { x, y, top = x } = axes
  const [w, h] = [written(size.widthPt), written(size.heightPt)]
  const ticks = [
    tickPath(x, "bottom", size, look),
    tickPath(y, "left", size, look),
    tickPath(top, "top", size, look),
    tickPath(y, "right", size, look),
  ]
  const d = `M0,0H${w}V${h}H0Z${ticks.join("")}`
  return { type: "path", d, fill: null, stroke: ink, widthPt: look.frameWidthPt }
}

/** The factor of an axis: beyond the right end of its numbers below, above the frame elsewhere. */
function factorText(
  { factor }: AxisDrawing,
  side: Side,
  { widthPt, heightPt }: FrameSize,
  { smallPt }: Look,
  toBaseline: number,
): readonly TextShape[] {
  if (!factor) return []
  const place = {
    bottom: { x: widthPt, y: heightPt + toBaseline + 1.25 * smallPt, align: "right" },
    left: { x: 0, y: -0.4 * smallPt, align: "left" },
    right: { x: widthPt, y: -0.4 * smallPt, align: "right" },
    top: { x: widthPt, y: -toBaseline - 1.25 * smallPt, align: "right" },
  } as const
  const style = { type: "text", baseline: "alphabetic", angle: 0, color: ink, bold: false } as const
  return [{ ...style, ...place[side], text: factor, fontPt: smallPt }]
}

/** Numbers and title of an axis on one side of the frame, outside it. */
export function axisTexts(
  axis: AxisDrawing,
  side: Side,
  { widthPt, heightPt }: FrameSize,
  look: Look,
  measure: MeasureLabel,
): readonly TextShape[] {
  const labelled = axis.major.filter(({ label, value }) => label !== "" && fractionAlong(axis, value) > -1e-6)
  const sizes = labelled.map(({ label }) => measure(label, false))
  const { smallPt, fontPt } = look
  const most = (pick: (size: (typeof sizes)[number]) => number) =>
    sizes.reduce((max, s) => Math.max(max, pick(s)), 0)
  const widest = most((size) => size.widthEm) * smallPt
  const highest = most((size) => size.heightEm) * smallPt
  const deepest = most((size) => size.depthEm) * smallPt
  const gap = tickToLabel * smallPt
  const toTitle = labelToTitle * fontPt
  const title = measure(axis.title, false)
  const horizontal = side === "bottom" || side === "top"
  const base = { type: "text", color: ink, bold: false, angle: 0 } as const
  const number = { ...base, fontPt: smallPt }
  const texts = labelled.map(({ value, label }): TextShape => {
    const at = fractionAlong(axis, value)
    if (horizontal) {
      const y = side === "bottom" ? heightPt + gap + highest : -gap - deepest
      return { ...number, text: label, x: widthPt * at, y, align: "center", baseline: "alphabetic" }
    }
    const x = side === "left" ? -gap : widthPt + gap
    const align = side === "left" ? "right" : "left"
    return { ...number, text: label, x, y: heightPt * (1 - at), align, baseline: "middle" }
  })
  const factor = factorText(axis, side, { widthPt, heightPt }, look, gap + highest)
  if (axis.title === "") return [...texts, ...factor]
  const numbers = labelled.length > 0
  const high = title.heightEm * fontPt
  const deep = title.depthEm * fontPt
  const titled = { ...base, text: axis.title, fontPt, align: "center", baseline: "alphabetic" } as const
  if (horizontal) {
    const below = heightPt + (numbers ? gap + highest + deepest * 0.5 : 0) + toTitle + high
    const above = -(numbers ? gap + deepest + highest : 0) - toTitle - deep
    return [...texts, ...factor, { ...titled, x: widthPt / 2, y: side === "bottom" ? below : above }]
  }
  const beside = (numbers ? gap + widest : 0) + toTitle
  const x = side === "left" ? -beside - deep : widthPt + beside + high
  return [...texts, ...factor, { ...titled, x, y: heightPt / 2, angle: -90 }]
}
