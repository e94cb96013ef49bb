import type { Data, Mark } from "vega"
import { axisOf, paddedDomain } from "../chart/axis"
import type { AxisDrawing, Frame, FrameLabel, Legend, PanelDrawing } from "../chart/drawing"
import { exponentTex } from "../chart/exponent-label"
import { bandMark, barsPath, dataSet, lineMark, panelSpec, pathMark, pointMark } from "../chart/marks"
import { framePositions } from "../chart/position"
import { seriesStyle } from "../chart/series-style"
import { labelAlong, placeSlopeGuide } from "../chart/slope-guide"
import { thinPoints } from "../chart/thin-points"
import { tint } from "../chart/tint"
import { alternativeText } from "./alternative-text"
import { decayTitles } from "./titles"
import type { DecayExponentParams } from "./params"
import type { DecayCurve, DecayResult } from "./result"

const fitColor = "#000000"
const guideColor = "#595959"
const bandStrength = 0.28
/** Distances of markers in marker sizes: points closer than the first are joined and only some get a marker. */
const crowded = 1.25
const markerSpacing = 2.6

type Positions = ReturnType<typeof framePositions>

/** A bar may leave the frame, where it is cut; far outside is as good as infinity and keeps coordinates short. */
const within = (y: number, heightPt: number) => Math.min(Math.max(y, -20), heightPt + 20)

function domains(result: DecayResult, params: DecayExponentParams) {
  const xScale = params.axes.x.scale ?? "log"
  const yScale = params.axes.y.scale ?? "log"
  const xs = result.curves.flatMap((curve) => curve.abscissa)
  const ys = result.curves.flatMap((curve) =>
    curve.mean.flatMap((mean, k) => {
      if (xScale === "log" && !(curve.abscissa[k]! > 0)) return []
      const error = curve.standardError[k] ?? 0
      // A bar that reaches far below the mean would squeeze the decay itself: on a log axis it may be cut.
      return yScale === "log"
        ? [mean + error, Math.max(mean - error, mean / 3)]
        : [mean + error, mean - error]
    }),
  )
  return {
    x: { scale: xScale, domain: params.axes.x.domain ?? paddedDomain(xs, xScale, 0.03) },
    y: { scale: yScale, domain: params.axes.y.domain ?? paddedDomain(ys, yScale, 0.06) },
  }
}

/** The points of one curve that the axes can show, with their places in the frame. */
function shownPoints(curve: DecayCurve, at: Positions) {
  return curve.abscissa.flatMap((t, k) => {
    const mean = curve.mean[k]!
    const error = curve.standardError[k] ?? null
    const [x, y] = [at.x(t), at.y(mean)]
    return Number.isFinite(x) && Number.isFinite(y) ? [{ t, mean, error, x, y }] : []
  })
}

interface DrawnCurve {
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

function drawCurve(
  curve: DecayCurve,
  index: number,
  at: Positions,
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
      ...(bars.length > 0 ? [pathMark(barsPath(bars), { color, widthPt: look.errorWidthPt })] : []),
      pointMark(name("marked"), "t", "mean", {
        marker,
        color,
        sizePt: look.markerSizePt,
        outlinePt: look.curveWidthPt,
      }),
    ],
  }
}

/** Reference slopes beside the curves, each with its label along it. */
function drawGuides(
  result: DecayResult,
  params: DecayExponentParams,
  drawn: readonly DrawnCurve[],
  axes: { readonly x: AxisDrawing; readonly y: AxisDrawing },
  at: Positions,
  { widthPt, heightPt, look }: Frame,
): { readonly marks: readonly Mark[]; readonly labels: readonly FrameLabel[] } {
  // A power law is a straight line on two logarithmic axes only.
  if (axes.x.scale !== "log" || axes.y.scale !== "log") return { marks: [], labels: [] }
  const perDecadeX = at.x(10) - at.x(1)
  const perDecadeY = at.y(10) - at.y(1)
  const windows = result.curves.flatMap((curve) => (curve.fit ? [curve.fit.window] : []))
  const left = Math.max(0, Math.min(...windows.map(([low]) => at.x(low)), Infinity))
  const right = Math.min(widthPt, Math.max(...windows.map(([, high]) => at.x(high)), -Infinity))
  const stretch = windows.length > 0 ? ([left, right] as const) : ([0.3 * widthPt, widthPt] as const)
  const curves: { x: number; y: number }[] = drawn.flatMap(({ points }) => points)
  const marks: Mark[] = []
  const labels: FrameLabel[] = []
  const labelPt = 1.35 * look.smallPt
  for (const { exponent, label } of params.references) {
    const slope = (exponent * perDecadeY) / perDecadeX
    const gapPt = 1.4 * look.smallPt
    const guide = placeSlopeGuide(slope, { widthPt, heightPt, curves, stretch, labelPt, gapPt })
    if (!guide) continue
    const { from, to } = guide
    const symbol = decayTitles(result).timeTex
    marks.push(
      pathMark(`M${from.x.toFixed(3)},${from.y.toFixed(3)}L${to.x.toFixed(3)},${to.y.toFixed(3)}`, {
        color: guideColor,
        widthPt: look.curveWidthPt,
        dash: [5 * look.curveWidthPt, 2 * look.curveWidthPt],
      }),
    )
    labels.push(labelAlong(label ?? `$${symbol}^{${exponentTex(exponent)}}$`, guideColor, guide, 2))
    // The next guide keeps clear of this one and its label.
    const clear = guide.side === "above" ? -labelPt : labelPt
    for (let k = 0; k <= 10; k += 1) {
      const [x, y] = [from.x + (k / 10) * (to.x - from.x), from.y + (k / 10) * (to.y - from.y)]
      curves.push({ x, y }, { x, y: y + clear })
    }
  }
  return { marks, labels }
}

/** For a single curve the law that was fitted stands at its line. */
function fitLabel(result: DecayResult, at: Positions, drawn: readonly DrawnCurve[]): readonly FrameLabel[] {
  const [curve] = result.curves
  const exponent = curve?.quantities.find(({ name }) => name === "exponent")
  if (result.curves.length !== 1 || !curve?.fit || !exponent || drawn.length !== 1) return []
  const { window, amplitude, exponent: power } = curve.fit
  const point = (share: number) => {
    const t = window[0] * (window[1] / window[0]) ** share
    return { x: at.x(t), y: at.y(amplitude * t ** power) }
  }
  const text = `$\\propto ${decayTitles(result).timeTex}^{${exponent.tex}}$`
  const along = (side: "above" | "below") =>
    labelAlong(text, fitColor, { from: point(0.1), to: point(0.9), side }, 5)
  const places = [...along("below").places, ...along("above").places]
  return [
    {
      ...along("below"),
      places: places.map((place) => ({
        ...place,
        angle: 0,
        align: place.baseline === "top" ? "right" : "left",
      })),
    },
  ]
}

function legendOf(result: DecayResult, { look }: Frame, drawn: readonly DrawnCurve[]): Legend {
  const { curveTitle, curveLabel, titled } = decayTitles(result)
  if (result.curves.length < 2) return { title: null, entries: [] }
  const entries = result.curves.map((curve, index) => {
    const { color, marker, dash } = seriesStyle(look, index)
    const line = drawn[index]!.joined ? dash : null
    return { label: curveLabel(curve.curve), color, marker, dash: line, widthPt: look.curveWidthPt }
  })
  const fitted = result.curves.some((curve) => curve.fit !== null)
  const fit = { label: "fit", color: fitColor, marker: null, dash: [], widthPt: look.curveWidthPt }
  return { title: titled ? curveTitle : null, entries: fitted ? [...entries, fit] : entries }
}

/**
 * Draws a decay panel: ensemble means with their bars, the fitted law solid in its window and dashed up to half a
 * decade outside, its band, reference slopes beside the data.
 *
 * @see docs/rendering.md "What a panel looks like"
 */
export function build(result: DecayResult, params: DecayExponentParams, frame: Frame): PanelDrawing {
  const { widthPt, heightPt, look } = frame
  const titles = decayTitles(result)
  const wish = domains(result, params)
  const x = axisOf({
    ...wish.x,
    title: params.axes.x.label ?? titles.x,
    direction: "horizontal",
    lengthPt: widthPt,
    look,
  })
  const y = axisOf({
    ...wish.y,
    title: params.axes.y.label ?? titles.y,
    direction: "vertical",
    lengthPt: heightPt,
    look,
  })
  const at = framePositions(x, y, widthPt, heightPt)
  const dense = result.curves.some((curve) => {
    const points = shownPoints(curve, at)
    return thinPoints(points, crowded * look.markerSizePt).length < 0.9 * points.length
  })
  const drawn = result.curves.map((curve, index) => drawCurve(curve, index, at, frame, dense))
  const guides = drawGuides(result, params, drawn, { x, y }, at, frame)
  const all = (part: "bands" | "lines" | "fits" | "markers") => drawn.flatMap((curve) => curve[part])
  const thinned = drawn.flatMap(({ marked, points }) =>
    marked.length < points.length ? [`${marked.length} of ${points.length}`] : [],
  )
  return {
    spec: panelSpec({
      widthPt,
      heightPt,
      x,
      y,
      data: drawn.flatMap((curve) => curve.data),
      // Data above the fit: the line must not hide what it claims to describe.
      marks: [...all("bands"), ...guides.marks, ...all("lines"), ...all("fits"), ...all("markers")],
    }),
    axes: { x, y },
    legend: legendOf(result, frame, drawn),
    labels: [...guides.labels, ...fitLabel(result, at, drawn)],
    colorBar: null,
    notes:
      thinned.length > 0
        ? [`Markers and error bars stand at ${[...new Set(thinned)].join(" and ")} times.`]
        : [],
    alternativeText: alternativeText(result, params, { x, y }),
  }
}
