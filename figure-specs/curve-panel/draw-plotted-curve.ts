import type { Data, Mark } from "vega"
import type { Frame } from "../chart/drawing"
import { bandMark, barsPath, dataSet, lineMark, pathMark, pointMark } from "../chart/marks"
import type { FramePositions } from "../chart/position"
import { seriesStyle } from "../chart/series-style"
import { thinPoints } from "../chart/thin-points"
import { tint } from "../chart/tint"
import type { PlottedBand, PlottedCurve, PlottedLine, PlottedPoint } from "./curve-panel"

export const fitColor = "#000000"
const bandStrength = 0.28
/** Distance of markers on a crowded curve, in marker sizes. */
const markerSpacing = 2.6
/** Points closer than this, in marker sizes, crowd. */
const crowded = 1.25

type Placed = PlottedPoint & { readonly px: number; readonly py: number }

/** The points of a curve that the axes can show. */
export const placedPoints = ({ points }: PlottedCurve, at: FramePositions): readonly Placed[] =>
  points.flatMap((point) => {
    const [px, py] = [at.x(point.x), at.y(point.y)]
    return Number.isFinite(px) && Number.isFinite(py) ? [{ ...point, px, py }] : []
  })

/** Whether the markers of a curve would run into each other. */
export function isCrowded(curve: PlottedCurve, at: FramePositions, markerSizePt: number): boolean {
  const points = placedPoints(curve, at).map(({ px, py }) => ({ x: px, y: py }))
  return thinPoints(points, crowded * markerSizePt).length < 0.9 * points.length
}

export interface DrawnPart {
  readonly data: readonly Data[]
  readonly bands: readonly Mark[]
  readonly lines: readonly Mark[]
  readonly markers: readonly Mark[]
  /** How many of how many points carry a marker. */
  readonly marked: number
  readonly total: number
  readonly joined: boolean
}

const bandRows = ({ x, low, high }: PlottedBand, at: FramePositions) =>
  x.flatMap((value, k) =>
    [at.x(value), at.y(low[k]!), at.y(high[k]!)].every(Number.isFinite)
      ? [{ x: value, low: low[k]!, high: high[k]! }]
      : [],
  )

/** Stretches of a line inside or outside its window; a dashed stretch takes the neighbouring solid point along. */
function lineRows({ x, y, outside }: PlottedLine, at: FramePositions, wanted: boolean) {
  const is = (k: number) => (outside?.[k] ?? false) === wanted
  return x.flatMap((value, k) => {
    const beside = wanted && ((k > 0 && is(k - 1)) || (k + 1 < x.length && is(k + 1)))
    const drawn = is(k) || beside
    const finite = [at.x(value), at.y(y[k]!)].every(Number.isFinite)
    if (!finite) return []
    if (drawn) return [{ x: value, y: y[k]!, gap: false }]
    return [{ x: value, y: y[k]!, gap: true }]
  })
}

function barsOf(points: readonly Placed[], at: FramePositions, { heightPt, look }: Frame) {
  // A bar may leave the frame, where it is cut; far outside is as good as infinity and keeps coordinates short.
  const within = (y: number) => Math.min(Math.max(y, -20), heightPt + 20)
  return points.flatMap(({ px, py, low, high }) => {
    if (low === null || high === null) return []
    const [bottom, top] = [at.y(low), within(at.y(high))]
    const to = Number.isFinite(bottom) ? within(bottom) : heightPt + 20
    return Math.max(to - py, py - top) > look.markerSizePt / 2 ? [{ x: px, from: top, to }] : []
  })
}

/** Marks of one curve; `index` chooses its style and names its tables. */
export function drawPlottedCurve(
  curve: PlottedCurve,
  index: number,
  at: FramePositions,
  frame: Frame,
  dense: boolean,
): DrawnPart {
  const { look } = frame
  const { color, marker, dash } = seriesStyle(look, index)
  const points = placedPoints(curve, at)
  const places = points.map(({ px, py }) => ({ x: px, y: py }))
  const shown = !curve.markers
    ? []
    : dense && curve.join !== "never"
      ? thinPoints(places, markerSpacing * look.markerSizePt).map((k) => points[k]!)
      : points
  const joined = curve.join === "always" || (curve.join === "crowded" && dense)
  const name = (part: string) => `${part}-${index}`
  const bars = barsOf(shown, at, frame)
  const xy = ({ x, y }: PlottedPoint) => ({ x, y })
  const outsideDash = [3 * look.curveWidthPt, 2.4 * look.curveWidthPt]
  const strokeOf = (line: PlottedLine) => ({
    color: line.color === "fit" ? fitColor : color,
    widthPt: look.curveWidthPt,
  })
  return {
    data: [
      ...(joined ? [dataSet(name("curve"), points.map(xy))] : []),
      dataSet(name("points"), shown.map(xy)),
      dataSet(name("bars"), bars.length > 0 ? [{ path: barsPath(bars) }] : []),
      ...curve.bands.map((band, k) => dataSet(name(`band-${k}`), bandRows(band, at))),
      ...curve.lines.flatMap((line, k) => [
        dataSet(name(`line-${k}`), lineRows(line, at, false)),
        dataSet(name(`outside-${k}`), line.outside?.includes(true) ? lineRows(line, at, true) : []),
      ]),
    ],
    bands: curve.bands.map((_, k) =>
      bandMark(name(`band-${k}`), "x", "low", "high", tint(color, bandStrength)),
    ),
    lines: [
      ...(joined ? [lineMark(name("curve"), "x", "y", { color, widthPt: look.curveWidthPt, dash })] : []),
      ...curve.lines.flatMap((line, k) => [
        lineMark(name(`outside-${k}`), "x", "y", { ...strokeOf(line), dash: outsideDash }),
        lineMark(name(`line-${k}`), "x", "y", {
          ...strokeOf(line),
          dash: line.color === "own" && !curve.markers ? dash : [],
        }),
      ]),
    ],
    markers: curve.markers
      ? [
          pathMark(name("bars"), { color, widthPt: look.errorWidthPt }),
          pointMark(name("points"), "x", "y", {
            marker,
            color,
            sizePt: look.markerSizePt,
            outlinePt: look.curveWidthPt,
          }),
        ]
      : [],
    marked: shown.length,
    total: points.length,
    joined,
  }
}
