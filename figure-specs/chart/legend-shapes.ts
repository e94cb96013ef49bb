import { ink } from "./axis-shapes"
import type { Legend, Look } from "./drawing"
import { isFilled, markerPath } from "./markers"
import { written } from "./position"
import type { MeasureLabel, Shape } from "./shape"

/** A legend and its size. */
export interface SetLegend {
  readonly widthPt: number
  readonly heightPt: number
  readonly shapes: readonly Shape[]
}

const paper = "#ffffff"

/**
 * Sets a legend: one key of line and marker a row, the text beside it.
 *
 * @param origin its top left corner
 * @param columns how many entries stand side by side; 1 for a legend inside a frame
 */
export function legendShapes(
  legend: Legend,
  look: Look,
  measure: MeasureLabel,
  origin: { readonly x: number; readonly y: number } = { x: 0, y: 0 },
  columns = 1,
): SetLegend {
  const { smallPt } = look
  const keyWidth = 1.9 * smallPt
  const keyToText = 0.45 * smallPt
  const row = 1.3 * smallPt
  const between = 1.4 * smallPt
  const shapes: Shape[] = []
  let top = origin.y
  let right = origin.x
  const text = { type: "text", fontPt: smallPt, color: ink, bold: false, angle: 0, align: "left" } as const
  if (legend.title) {
    shapes.push({ ...text, text: legend.title, x: origin.x, y: origin.y + 0.5 * row, baseline: "middle" })
    right = origin.x + measure(legend.title, false).widthEm * smallPt
    top += row
  }
  const perColumn = Math.ceil(legend.entries.length / columns)
  let left = origin.x
  for (let column = 0; column < columns; column += 1) {
    const entries = legend.entries.slice(column * perColumn, (column + 1) * perColumn)
    let widest = 0
    entries.forEach((entry, index) => {
      const y = top + (index + 0.5) * row
      if (entry.dash) {
        const d = `M${written(left)},${written(y)}h${written(keyWidth)}`
        shapes.push({
          type: "path",
          d,
          fill: null,
          stroke: entry.color,
          widthPt: entry.widthPt,
          dash: entry.dash,
        })
      }
      if (entry.marker) {
        const d = markerPath(entry.marker, left + keyWidth / 2, y, look.markerSizePt / 2)
        const fill = isFilled(entry.marker) ? entry.color : paper
        const stroke = isFilled(entry.marker) ? null : entry.color
        shapes.push({ type: "path", d, fill, stroke, widthPt: look.curveWidthPt })
      }
      shapes.push({ ...text, text: entry.label, x: left + keyWidth + keyToText, y, baseline: "middle" })
      widest = Math.max(widest, measure(entry.label, false).widthEm * smallPt)
    })
    const end = left + keyWidth + keyToText + widest
    right = Math.max(right, end)
    left = end + between
  }
  return { widthPt: right - origin.x, heightPt: top - origin.y + perColumn * row, shapes }
}
