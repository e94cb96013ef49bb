import { axisTitle, symbolOf, unitLabel } from "../chart/axis-title"
import type { CurveKey } from "../figure-kind"
import type { DescribedColumns } from "./described-columns"

/** Up to this many curves each says its parameter in full; beyond, the legend's title says it once. */
const fullLabels = 3

/** Words and symbols of a panel of curves, from the names, symbols and units of its columns. */
export function curveTitles(
  result: DescribedColumns & { readonly curves: readonly { readonly curve: CurveKey }[] },
) {
  const { abscissa, observable, curveBy } = result
  const abscissaTex = symbolOf(abscissa) ?? "t"
  const plain = symbolOf(observable)
  // A symbol with its own argument, such as n(t), is left as its author wrote it.
  const at = (time: string) => (plain?.includes("(") ? plain : `${plain}(${time})`)
  const mean = plain === null ? null : `\\langle ${at(abscissaTex)}\\rangle`
  const normalised = plain === null ? null : `${at(abscissaTex)}/${plain.replace(/\(.*\)$/, "")}(0)`
  const unitless = observable.normalised ? { ...observable, unit: null } : observable
  const curveTex = curveBy ? symbolOf(curveBy) : null
  const unit = curveBy?.unit ? `\u2009${unitLabel(curveBy.unit)}` : ""
  const titled = result.curves.length > fullLabels
  const value = (curve: CurveKey) =>
    typeof curve === "number" ? String(curve).replace("-", "\u2212") : (curve ?? "").replaceAll("$", "\\$")
  const curveLabel = (curve: CurveKey): string => {
    if (!curveBy || titled || typeof curve === "string") return value(curve)
    return `${curveTex ? `$${curveTex}$` : curveBy.name} = ${value(curve)}${unit}`
  }
  return {
    x: axisTitle(abscissa),
    y: axisTitle(unitless, observable.normalised ? normalised : mean),
    abscissaTex,
    curveTitle: curveBy ? axisTitle(curveBy) : "",
    curveLabel,
    titled,
  }
}
