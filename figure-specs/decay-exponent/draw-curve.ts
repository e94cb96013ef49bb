import type { Data, Mark } from "vega"
import type { Frame } from "../chart/drawing"
import { bandMark, barsPath, dataSet, lineMark, pathMark, pointMark } from "../chart/marks"
import type { FramePositions } from "../chart/position"
import { seriesStyle } from "../chart/series-style"
import { thinPoints } from "../chart/thin-points"
import { tint } from "../chart/tint"
import type { DecayCurve } from "./result"

export const fitColor = "#000000"
const bandStrength = 0.28
/** Distance of markers on a crowded curve, in marker sizes. */
const markerSpacing = 2.6

/** A bar may leave the frame, where it is cut; far outside is as good as infinity and keeps coordinates short. */
const within = (y: number, heightPt: number) => Math.min(Math.max(y, -20), heightPt + 20)

/** The points of one curve that the axes can show, with their places in the frame. */
export function shownPoints(curve: DecayCurve, at: FramePositions) {
  return curve.abscissa.flatMap((t, k) => {
    const mean = curve.mean[k]!
    const error = curve.standardError[k] ?? null
    const [x, y] = [at.x(t), at.y(mean)]
    return Number.isFinite(x) && Number.isFinite(y) ? [{ t, mean, error, x, y }] : []
  })
}

export interface DrawnCurve {
  readonly points: ReturnType<typeof shownPoints>
  readonly data: readonly Data[]
  readonly bands: readonly Mark[]
  readonly lines: readonly Mark[]
  readonly fits: readonly Mark[]
  readonly markers: readonly Mark[]
  /** Indices of the points that carry a marker. */
  readonly marked: readonly number[]
  readonly joined: boolean
}

/**
 * Draws one curve with its fit.
 *
 * @param dense whether points crowd: then they are joined and only some carry a marker
 */
export function drawCurve(
  curve: DecayCurve,
  index: number,
  at: FramePositions,
  { heightPt, look }: Frame,
  dense: boolean,
): DrawnCurve {
  const { color, marker, dash } = seriesStyle(look, index)
  const points = shownPoints(curve, at)
  const marked = dense ? thinPoints(points, markerSpacing * look.markerSizePt) : points.map((_, k) => k)
  const joined = dense || curve.fit === null
  const name = (part: string) => `${part}-${index}`
  const bars = marked.flatMap((k) => {
    const { x, y, mean, error } = points[k]!
    if (error === null) return []
    const [low, high] = [within(at.y(mean - error), heightPt), within(at.y(mean + error), heightPt)]
    // Without this, a mean below its error would have no lower end on a log axis.
    const to = Number.isFinite(low) ? low : heightPt + 20
    return Math.max(to - y, y - high) > look.markerSizePt / 2 ? [{ x, from: high, to }] : []
  })
  const fit = curve.fit
  const fitRows = fit?.grid.map((t, k) => ({ t, fit: fit.line[k]!, outside: fit.outside[k]! })) ?? []
  const firstInside = fitRows.findIndex((row) => !row.outside)
  const lastInside = fitRows.findLastIndex((row) => !row.outside)
  const plain = ({ t, fit: value }: { t: number; fit: number }) => ({ t, fit: value, gap: false })
  // Each dashed end takes the nearest point of the window along, so that it joins the solid line.
  const before = fitRows.slice(0, firstInside + 1).map(plain)
  const after = fitRows.slice(lastInside).map(plain)
  const fitData = [
    dataSet(name("fit"), fitRows.slice(firstInside, lastInside + 1).map(plain)),
    dataSet(name("extrapolation"), [
      ...before,
      ...after.slice(0, 1).map((row) => ({ ...row, gap: true })),
      ...after,
    ]),
  ]
  const bandRows =
    fit?.bandLow && fit.bandHigh
      ? fit.grid.flatMap((t, k) =>
          fit.outside[k] ? [] : [{ t, low: fit.bandLow![k]!, high: fit.bandHigh![k]! }],
        )
      : []
  const fitStroke = { color: fitColor, widthPt: look.curveWidthPt }
  const outsideDash = [3 * look.curveWidthPt, 2.4 * look.curveWidthPt]
  return {
    points,
    marked,
    joined,
    data: [
      dataSet(
        name("mean"),
        points.map(({ t, mean }) => ({ t, mean })),
      ),
      dataSet(
        name("marked"),
        marked.map((k) => ({ t: points[k]!.t, mean: points[k]!.mean })),
      ),
      dataSet(name("bars"), bars.length > 0 ? [{ path: barsPath(bars) }] : []),
      ...(fit ? fitData : []),
      ...(bandRows.length > 0 ? [dataSet(name("band"), bandRows)] : []),
    ],
    bands: bandRows.length > 0 ? [bandMark(name("band"), "t", "low", "high", tint(color, bandStrength))] : [],
    lines: joined ? [lineMark(name("mean"), "t", "mean", { color, widthPt: look.curveWidthPt, dash })] : [],
    fits: fit
      ? [
          lineMark(name("extrapolation"), "t", "fit", { ...fitStroke, dash: outsideDash }),
          lineMark(name("fit"), "t", "fit", fitStroke),
        ]
      : [],
    markers: [
      pathMark(name("bars"), { color, widthPt: look.errorWidthPt }),
      pointMark(name("marked"), "t", "mean", {
        marker,
        color,
        sizePt: look.markerSizePt,
        outlinePt: look.curveWidthPt,
      }),
    ],
  }
}
