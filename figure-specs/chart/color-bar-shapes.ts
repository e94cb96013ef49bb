import { axisTexts, ink } from "./axis-shapes"
import type { ColorBarDrawing, Frame } from "./drawing"
import { indexedPng, pngAddress } from "./indexed-png"
import { fractionAlong, written } from "./position"
import type { MeasureLabel, Shape, TextShape } from "./shape"

/** Distance of the bar from the frame and its width, in sizes of the numbers beside it. */
const gapEm = 0.7
const widthEm = 1

function barPlace({ widthPt, look }: Frame): { readonly left: number; readonly right: number } {
  const left = widthPt + gapEm * look.smallPt
  return { left, right: left + widthEm * look.smallPt }
}

/** Numbers and title of a colour bar at the right of a frame. */
export function colorBarTexts(
  bar: ColorBarDrawing,
  frame: Frame,
  measure: MeasureLabel,
): readonly TextShape[] {
  const reach = { widthPt: barPlace(frame).right, heightPt: frame.heightPt }
  return axisTexts(bar.axis, "right", reach, frame.look, measure)
}

/** The bar itself: its colours, its outline and its ticks. */
export function colorBarShapes({ axis, colors }: ColorBarDrawing, frame: Frame): readonly Shape[] {
  const { left, right } = barPlace(frame)
  const { heightPt, look } = frame
  const upwards = Uint8Array.from(colors, (_, k) => colors.length - 1 - k)
  const href = pngAddress(indexedPng(upwards, 1, colors.length, colors))
  const ticks = axis.major.map(({ value }) => {
    const y = written(heightPt * (1 - fractionAlong(axis, value)))
    return `M${written(right)},${y}h${-written(0.3 * (right - left))}`
  })
  const d = `M${written(left)},0H${written(right)}V${written(heightPt)}H${written(left)}Z${ticks.join("")}`
  return [
    { type: "image", href, x: left, y: 0, width: right - left, height: heightPt },
    { type: "path", d, fill: null, stroke: ink, widthPt: look.frameWidthPt },
  ]
}
