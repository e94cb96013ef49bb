import type { Mark } from "vega"
import { axisOf } from "./axis"
import { colorSteps } from "./color-map"
import type { AxisDrawing, ColorBarDrawing, Look, ScaleType } from "./drawing"
import { indexedPng, pngAddress } from "./indexed-png"
import { fractionAlong } from "./position"
import { symlogTicks } from "./symlog-ticks"

/** Colours of a map's scale; the last place of the palette is kept for what is missing. */
const colorCount = 255
const missingColor = "#bfbfbf"
/** Cells are repeated until the image has this many pixels a point, 600 an inch, so that no viewer blurs their edges. */
const pixelsPerPoint = 600 / 72
const largestSide = 4000

/** A field on a regular grid. */
export interface HeatField {
  /** Row by row, the first row at the lower end of the ordinate; NaN where nothing was measured. */
  readonly values: Float64Array | readonly number[]
  readonly columns: number
  readonly rows: number
}

/** How values become colours. */
export interface ColorScale {
  readonly scale: ScaleType
  readonly domain: readonly [number, number]
  readonly symlogConstant?: number
}

/** Place of a colour in the palette: ends of the scale and beyond get the end colours, what has none is missing. */
function colorIndex(scale: ColorScale, value: number): number {
  const share = fractionAlong(scale, value)
  if (Number.isNaN(share) || (scale.scale === "log" && !(value > 0))) return colorCount
  return Math.min(colorCount - 1, Math.max(0, Math.round(share * (colorCount - 1))))
}

/** Images of a field by what they were made with: the layout draws a panel several times until its frame is settled. */
const made = new WeakMap<object, Map<string, string>>()

/** How often a cell is repeated along a side of the frame. */
const repeats = (cells: number, pt: number): number =>
  Math.max(1, Math.min(Math.ceil((pt * pixelsPerPoint) / cells), Math.floor(largestSide / cells)))

function paintField(field: HeatField, scale: ColorScale, look: Look, across: number, down: number): string {
  const { values, columns, rows } = field
  const [width, height] = [columns * across, rows * down]
  const pixels = new Uint8Array(width * height)
  for (let row = 0; row < rows; row += 1) {
    const line = pixels.subarray(row * down * width, (row * down + 1) * width)
    const source = (rows - 1 - row) * columns
    for (let column = 0; column < columns; column += 1)
      line.fill(colorIndex(scale, values[source + column]!), column * across, (column + 1) * across)
    for (let copy = 1; copy < down; copy += 1) pixels.set(line, (row * down + copy) * width)
  }
  return pngAddress(
    indexedPng(pixels, width, height, [...colorSteps(look.colorMap, colorCount), missingColor]),
  )
}

/** The field as an image of hard-edged cells, one PNG whatever its size. */
export function heatImage(
  field: HeatField,
  scale: ColorScale,
  look: Look,
  size: { readonly widthPt: number; readonly heightPt: number },
): string {
  const [across, down] = [repeats(field.columns, size.widthPt), repeats(field.rows, size.heightPt)]
  const key = JSON.stringify([field.columns, scale, look.colorMap, across, down])
  const known = made.get(field.values) ?? new Map<string, string>()
  made.set(field.values, known)
  let image = known.get(key)
  if (image === undefined) known.set(key, (image = paintField(field, scale, look, across, down)))
  return image
}

/** The image as a mark that fills a rectangle of the data, edges of the outermost cells. */
export const heatMark = (data: string): Mark => ({
  type: "image",
  from: { data },
  encode: {
    enter: {
      url: { field: "url" },
      x: { scale: "x", field: "x0" },
      x2: { scale: "x", field: "x1" },
      y: { scale: "y", field: "y1" },
      y2: { scale: "y", field: "y0" },
      aspect: { value: false },
      smooth: { value: false },
    },
  },
})

/** The colour bar of a scale, with its ticks set as those of an axis. */
export function colorBarOf(title: string, scale: ColorScale, lengthPt: number, look: Look): ColorBarDrawing {
  const wish = { title, domain: scale.domain, direction: "vertical", lengthPt, look } as const
  const axis: AxisDrawing =
    scale.scale === "symlog"
      ? { ...scale, title, ...symlogTicks(scale.domain, scale.symlogConstant ?? 1) }
      : axisOf({ ...wish, scale: scale.scale })
  return { axis, colors: colorSteps(look.colorMap, colorCount) }
}
