import type { AxisDrawing } from "../chart/drawing"
import type { DecayExponentParams } from "./params"
import type { DecayResult } from "./result"

const number = (value: number): string => Number(value.toPrecision(3)).toString()
const range = (axis: AxisDrawing) => `${number(axis.domain[0])} to ${number(axis.domain[1])}`

/** What a decay panel shows, for readers who cannot see it. */
export function alternativeText(
  result: DecayResult,
  params: DecayExponentParams,
  { x, y }: { readonly x: AxisDrawing; readonly y: AxisDrawing },
): string {
  const { abscissa, observable, curveBy, curves } = result
  const scales = x.scale === y.scale ? `${x.scale}–${y.scale}` : `${x.scale} x, ${y.scale} y`
  const ratio = observable.normalised ? " relative to its initial value" : ""
  const unit = abscissa.unit ? ` ${abscissa.unit}` : ""
  const split =
    curveBy && curves.length > 1
      ? `; ${curves.length} curves for ${curveBy.name} = ${curves.map(({ curve }) => curve).join(", ")}`
      : ""
  const fits = curves.flatMap((curve) => {
    const exponent = curve.quantities.find(({ name }) => name === "exponent")
    if (!curve.fit || !exponent) return []
    const which = curves.length > 1 && curve.curve !== null ? `${curve.curve}: ` : ""
    const [low, high] = curve.fit.window
    return [`${which}exponent ${exponent.text} for ${abscissa.name} from ${number(low)} to ${number(high)}`]
  })
  const slopes = params.references.map(({ exponent }) => number(exponent))
  return [
    `Mean of ${observable.name}${ratio} against ${abscissa.name}, ${scales} axes, ${abscissa.name} ${range(x)}${unit}`,
    `, ${observable.name} ${range(y)}${split}.`,
    fits.length > 0 ? ` Power-law fit${fits.length > 1 ? "s" : ""}: ${fits.join("; ")}.` : "",
    slopes.length > 0 ? ` Reference slope${slopes.length > 1 ? "s" : ""} ${slopes.join(", ")}.` : "",
  ].join("")
}
