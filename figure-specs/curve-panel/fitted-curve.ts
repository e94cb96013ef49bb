import type { PlottedCurve } from "./curve-panel"
import type { DrawnLine, DrawnMean } from "./curve-series"

/** A reduced curve with its fitted line and its band inside the window. @param bars what error bars show */
export function fittedCurve(
  curve: DrawnMean & { readonly fit: DrawnLine | null },
  label: string | null,
  bars: "standard-error" | "none",
): PlottedCurve {
  const { fit } = curve
  const inside = fit ? [...fit.grid.keys()].filter((k) => !fit.outside[k]) : []
  const pick = (values: readonly number[]) => inside.map((k) => values[k]!)
  return {
    label,
    points: curve.abscissa.map((x, k) => {
      const y = curve.mean[k]!
      const error = bars === "none" ? null : (curve.standardError[k] ?? null)
      return { x, y, low: error === null ? null : y - error, high: error === null ? null : y + error }
    }),
    join: "crowded",
    markers: true,
    lines: fit ? [{ x: fit.grid, y: fit.line, outside: fit.outside, color: "fit" }] : [],
    bands:
      fit?.bandLow && fit.bandHigh
        ? [{ x: pick(fit.grid), low: pick(fit.bandLow), high: pick(fit.bandHigh) }]
        : [],
  }
}
