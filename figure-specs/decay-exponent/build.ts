import { axisOf, paddedDomain } from "../chart/axis"
import type { Frame, FrameLabel, Legend, PanelDrawing } from "../chart/drawing"
import { panelSpec } from "../chart/marks"
import { framePositions, type FramePositions } from "../chart/position"
import { referenceGuides } from "../chart/reference-guides"
import { seriesStyle } from "../chart/series-style"
import { labelAlong } from "../chart/slope-guide"
import { thinPoints } from "../chart/thin-points"
import { curveTitles } from "../curve-panel/curve-titles"
import { alternativeText } from "./alternative-text"
import { drawCurve, fitColor, shownPoints, type DrawnCurve } from "./draw-curve"
import type { DecayExponentParams } from "./params"
import type { DecayResult } from "./result"

/** Points closer than this, in marker sizes, crowd. */
const crowded = 1.25

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

/** Where a reference slope is of use: along the fit windows, or where the early times are over. */
function guideStretch(result: DecayResult, at: FramePositions, widthPt: number): readonly [number, number] {
  const windows = result.curves.flatMap((curve) => (curve.fit ? [curve.fit.window] : []))
  if (windows.length === 0) return [0.3 * widthPt, widthPt]
  const left = Math.min(...windows.map(([low]) => at.x(low)))
  const right = Math.max(...windows.map(([, high]) => at.x(high)))
  return [Math.max(0, left), Math.min(widthPt, right)]
}

/** For a single curve the law that was fitted stands at its line. */
function fitLabel(
  result: DecayResult,
  at: FramePositions,
  drawn: readonly DrawnCurve[],
): readonly FrameLabel[] {
  const [curve] = result.curves
  const exponent = curve?.quantities.find(({ name }) => name === "exponent")
  if (result.curves.length !== 1 || !curve?.fit || !exponent || drawn.length !== 1) return []
  const { window, amplitude, exponent: power } = curve.fit
  const point = (share: number) => {
    const t = window[0] * (window[1] / window[0]) ** share
    return { x: at.x(t), y: at.y(amplitude * t ** power) }
  }
  const text = `$\\propto ${curveTitles(result).abscissaTex}^{${exponent.tex}}$`
  const falling = power < 0
  const places = (["below", "above"] as const).flatMap((side) =>
    labelAlong(text, fitColor, { from: point(0.1), to: point(0.9), side }, 5).places.map((place) => ({
      ...place,
      // Upright beside a slanted line, a label must hang on the side that the line leaves free.
      angle: 0,
      align: (side === "below") === falling ? ("right" as const) : ("left" as const),
    })),
  )
  return [{ text, color: fitColor, small: true, optional: true, places }]
}

function legendOf(result: DecayResult, { look }: Frame, drawn: readonly DrawnCurve[]): Legend {
  const { curveTitle, curveLabel, titled } = curveTitles(result)
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
  const titles = curveTitles(result)
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
  const guides = referenceGuides(
    params.references,
    {
      symbol: titles.abscissaTex,
      curves: drawn.flatMap(({ points }) => points),
      stretch: guideStretch(result, at, widthPt),
      axes: { x, y },
      at,
    },
    frame,
  )
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
      data: [...guides.data, ...drawn.flatMap((curve) => curve.data)],
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
