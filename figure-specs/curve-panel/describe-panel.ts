import type { AxisDrawing } from "../chart/drawing"
import type { CurveResult } from "../figure-kind"
import type { DescribedColumns } from "./described-columns"

const number = (value: number): string => Number(value.toPrecision(3)).toString()
export const rangeText = ({ domain: [low, high] }: AxisDrawing): string => `${number(low)} to ${number(high)}`

/** "log x, linear y axes", "log–log axes". */
export const scalesText = ({ x, y }: { readonly x: AxisDrawing; readonly y: AxisDrawing }): string =>
  x.scale === y.scale ? `${x.scale}–${y.scale} axes` : `${x.scale} x, ${y.scale} y axes`

/** The numbers that the curves of a panel yield, as text for readers who cannot see it. */
export function quantitiesText(
  curves: readonly CurveResult[],
  names: readonly string[],
  curveBy: string | null,
): string {
  const texts = curves.flatMap(({ curve, quantities }) =>
    quantities
      .filter(({ name }) => names.includes(name))
      .map(({ name, text }) => `${name} ${text}${curve === null ? "" : ` for ${curveBy} = ${curve}`}`),
  )
  return texts.length === 0 ? "" : ` ${capital(texts.join("; "))}.`
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1)

/** What a panel of ensemble curves shows. @param names the quantities to tell */
export function describePanel(
  { abscissa, observable, curveBy, curves }: DescribedColumns & { readonly curves: readonly CurveResult[] },
  axes: { readonly x: AxisDrawing; readonly y: AxisDrawing },
  names: readonly string[],
): string {
  const ratio = observable.normalised ? " relative to its initial value" : ""
  const unit = abscissa.unit ? ` ${abscissa.unit}` : ""
  const split =
    curveBy && curves.length > 1
      ? `; ${curves.length} curves for ${curveBy.name} = ${curves.map(({ curve }) => curve).join(", ")}`
      : ""
  return (
    `Mean of ${observable.name}${ratio} against ${abscissa.name}, ${scalesText(axes)}, ` +
    `${abscissa.name} ${rangeText(axes.x)}${unit}, ${observable.name} ${rangeText(axes.y)}${split}.` +
    quantitiesText(curves, names, curveBy?.name ?? null)
  )
}
