import type { Frame, PanelDrawing } from "../chart/drawing"
import { buildCurvePanel } from "../curve-panel/build-curve-panel"
import type { PlottedCurve } from "../curve-panel/curve-panel"
import { curveTitles } from "../curve-panel/curve-titles"
import { describePanel } from "../curve-panel/describe-panel"
import { theoryRules } from "../curve-panel/theory-rules"
import type { EnsembleTraceParams } from "./params"
import type { TraceCurve, TraceResult } from "./result"

function plotted(curve: TraceCurve, label: string | null): PlottedCurve {
  const { abscissa, mean, bandLow, bandHigh, saturation } = curve
  const known = abscissa.flatMap((_, k) => (bandLow?.[k] == null || bandHigh?.[k] == null ? [] : [k]))
  return {
    label,
    points: [],
    join: "never",
    markers: false,
    lines: [
      { x: abscissa, y: mean, color: "own" },
      ...(saturation
        ? [{ x: saturation.window, y: [saturation.value, saturation.value], color: "fit" as const }]
        : []),
    ],
    bands:
      known.length > 0
        ? [
            {
              x: known.map((k) => abscissa[k]!),
              low: known.map((k) => bandLow![k]!),
              high: known.map((k) => bandHigh![k]!),
            },
          ]
        : [],
  }
}

/** Draws ensemble means as lines in their bands, with the saturation value over its window. */
export function build(result: TraceResult, params: EnsembleTraceParams, frame: Frame): PanelDrawing {
  const titles = curveTitles(result)
  const many = result.curves.length > 1
  return buildCurvePanel(
    {
      curves: result.curves.map((curve) => plotted(curve, many ? titles.curveLabel(curve.curve) : null)),
      legendTitle: many && titles.titled ? titles.curveTitle : null,
      x: { title: titles.x, scale: "linear", params: params.axes.x },
      y: { title: titles.y, scale: "linear", params: params.axes.y },
      rules: theoryRules(result.quantities, "y"),
      fitLabel: "saturated",
    },
    frame,
    (axes) => describePanel(result, axes, ["saturation"]),
  )
}
