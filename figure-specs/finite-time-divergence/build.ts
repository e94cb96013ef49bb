import type { Frame, PanelDrawing } from "../chart/drawing"
import { buildCurvePanel } from "../curve-panel/build-curve-panel"
import { curveTitles } from "../curve-panel/curve-titles"
import { describePanel } from "../curve-panel/describe-panel"
import { fittedCurve } from "../curve-panel/fitted-curve"
import type { FiniteTimeDivergenceParams } from "./params"
import type { DivergenceResult } from "./result"

/** Draws growth towards a singular time: points, the law solid in its window, each t* as a vertical line. */
export function build(
  result: DivergenceResult,
  params: FiniteTimeDivergenceParams,
  frame: Frame,
): PanelDrawing {
  const titles = curveTitles(result)
  const many = result.curves.length > 1
  return buildCurvePanel(
    {
      curves: result.curves.map((curve) =>
        fittedCurve(curve, many ? titles.curveLabel(curve.curve) : null, params.reduction.uncertainty),
      ),
      legendTitle: many && titles.titled ? titles.curveTitle : null,
      x: { title: titles.x, scale: "linear", params: params.axes.x },
      y: { title: titles.y, scale: "log", params: params.axes.y },
      rules: result.curves.flatMap(({ fit }) =>
        fit ? [{ axis: "x" as const, from: fit.singularTime, label: `$${titles.abscissaTex}^\\ast$` }] : [],
      ),
      fitLabel: "fit",
    },
    frame,
    (axes) => describePanel(result, axes, ["singularTime", "divergenceExponent"]),
  )
}
