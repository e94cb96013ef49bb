import { axisOf } from "../chart/axis"
import type { Frame, Legend, LegendEntry, PanelDrawing } from "../chart/drawing"
import { panelSpec } from "../chart/marks"
import { framePositions } from "../chart/position"
import { referenceGuides } from "../chart/reference-guides"
import { seriesStyle } from "../chart/series-style"
import type { CurvePanel } from "./curve-panel"
import { drawPlottedCurve, fitColor, isCrowded, placedPoints, type DrawnPart } from "./draw-plotted-curve"
import { panelDomains } from "./panel-domains"
import { drawRules } from "./panel-rules"

function legendOf(panel: CurvePanel, drawn: readonly DrawnPart[], { look }: Frame): Legend {
  const entries = panel.curves.flatMap((curve, index): LegendEntry[] => {
    if (curve.label === null) return []
    const { color, marker, dash } = seriesStyle(look, index)
    const line = drawn[index]!.joined || !curve.markers ? dash : null
    return [
      {
        label: curve.label,
        color,
        marker: curve.markers ? marker : null,
        dash: line,
        widthPt: look.curveWidthPt,
      },
    ]
  })
  const fitted = panel.curves.some(({ lines }) => lines.some(({ color }) => color === "fit"))
  const fit: LegendEntry[] =
    fitted && panel.fitLabel !== undefined && entries.length > 0
      ? [{ label: panel.fitLabel, color: fitColor, marker: null, dash: [], widthPt: look.curveWidthPt }]
      : []
  return { title: panel.legendTitle, entries: entries.length + fit.length > 1 ? [...entries, ...fit] : [] }
}

/**
 * Draws a panel of curves: bands under lines under markers, rules and reference slopes beside them. What the kinds add is
 * what their curves are and how they are called.
 *
 * @param describe says in words what is drawn, given the axes
 */
export function buildCurvePanel(
  panel: CurvePanel,
  frame: Frame,
  describe: (axes: PanelDrawing["axes"]) => string,
): PanelDrawing {
  const { widthPt, heightPt, look } = frame
  const domains = panelDomains(panel)
  const title = (axis: "x" | "y") => panel[axis].params.label ?? panel[axis].title
  const x = axisOf({ ...domains.x, title: title("x"), direction: "horizontal", lengthPt: widthPt, look })
  const y = axisOf({ ...domains.y, title: title("y"), direction: "vertical", lengthPt: heightPt, look })
  const at = framePositions(x, y, widthPt, heightPt)
  const dense = panel.curves.some((curve) => curve.markers && isCrowded(curve, at, look.markerSizePt))
  const drawn = panel.curves.map((curve, index) => drawPlottedCurve(curve, index, at, frame, dense))
  const rules = drawRules(panel.rules, at, frame)
  const guides = referenceGuides(
    panel.references?.slopes ?? [],
    {
      symbol: panel.references?.symbol ?? "x",
      curves: panel.curves.flatMap((curve) =>
        placedPoints(curve, at).map(({ px, py }) => ({ x: px, y: py })),
      ),
      stretch: [0.2 * widthPt, widthPt],
      axes: { x, y },
      at,
    },
    frame,
  )
  const thinned = drawn.flatMap(({ marked, total }) =>
    marked > 0 && marked < total ? [`${marked} of ${total}`] : [],
  )
  const all = (part: "bands" | "lines" | "markers") => drawn.flatMap((curve) => curve[part])
  return {
    spec: panelSpec({
      widthPt,
      heightPt,
      x,
      y,
      data: [...rules.data, ...guides.data, ...drawn.flatMap((curve) => curve.data)],
      // Data above the lines: a line must not hide what it claims to describe.
      marks: [
        ...rules.strips,
        ...all("bands"),
        ...rules.lines,
        ...guides.marks,
        ...all("lines"),
        ...all("markers"),
      ],
    }),
    axes: { x, y },
    legend: legendOf(panel, drawn, frame),
    labels: [...guides.labels, ...rules.labels],
    colorBar: null,
    notes:
      thinned.length > 0
        ? [`Markers and error bars stand at ${[...new Set(thinned)].join(" and ")} points.`]
        : [],
    alternativeText: describe({ x, y }),
  }
}
