import { axisTitle } from "../chart/axis-title"
import type { Frame, PanelDrawing } from "../chart/drawing"
import { buildCurvePanel } from "../curve-panel/build-curve-panel"
import type { PlottedCurve } from "../curve-panel/curve-panel"
import { curveTitles } from "../curve-panel/curve-titles"
import { describePanel } from "../curve-panel/describe-panel"
import { fittedCurve } from "../curve-panel/fitted-curve"
import { timeQuantities } from "./fit-times"
import type { CharacteristicTimeParams } from "./params"
import type { CharacteristicTimeResult, TimeCurve } from "./result"

/** Points, the law that is shown with its band, and the others dashed throughout. */
function plotted(curve: TimeCurve, label: string | null, bars: "standard-error" | "none"): PlottedCurve {
  const [shown = null, ...others] = curve.laws
  const base = fittedCurve({ ...curve, fit: shown }, label, bars)
  return {
    ...base,
    join: "never",
    lines: [
      ...base.lines,
      ...others.map(({ grid, line }) => ({
        x: grid,
        y: line,
        outside: grid.map(() => true),
        color: "fit" as const,
      })),
    ],
  }
}

/** Draws a characteristic time against its control parameter with the laws that are compared. */
export function build(
  result: CharacteristicTimeResult,
  params: CharacteristicTimeParams,
  frame: Frame,
): PanelDrawing {
  const titles = curveTitles(result)
  const many = result.curves.length > 1
  const shown = result.curves[0]?.laws[0]?.law ?? "power"
  return buildCurvePanel(
    {
      curves: result.curves.map((curve) =>
        plotted(curve, many ? titles.curveLabel(curve.curve) : null, params.reduction.uncertainty),
      ),
      legendTitle: many && titles.titled ? titles.curveTitle : null,
      x: { title: titles.x, scale: shown === "exponential" ? "linear" : "log", params: params.axes.x },
      y: { title: axisTitle(result.observable), scale: "log", params: params.axes.y },
      rules: [],
      references: { slopes: params.references, symbol: titles.abscissaTex },
      fitLabel: "fit",
    },
    frame,
    (axes) => describePanel(result, axes, timeQuantities),
  )
}
