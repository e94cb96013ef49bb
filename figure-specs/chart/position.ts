import type { AxisDrawing } from "./drawing"

/** The stretch of an axis that its position depends on; the same formulas as Vega's scales of these names. */
type AxisScale = Pick<AxisDrawing, "scale" | "domain" | "symlogConstant">

function transform({ scale, symlogConstant = 1 }: AxisScale, value: number): number {
  if (scale === "log") return Math.log(value)
  if (scale === "symlog") return Math.sign(value) * Math.log1p(Math.abs(value) / symlogConstant)
  return value
}

/** Place of a value along its axis as a fraction, 0 at the lower end of the domain and 1 at the upper one. */
export function fractionAlong(axis: AxisScale, value: number): number {
  const low = transform(axis, axis.domain[0])
  const high = transform(axis, axis.domain[1])
  return (transform(axis, value) - low) / (high - low)
}

/** Maps data to points of a frame, from its top left corner. */
export interface FramePositions {
  readonly x: (value: number) => number
  readonly y: (value: number) => number
}

export function framePositions(
  x: AxisScale,
  y: AxisScale,
  widthPt: number,
  heightPt: number,
): FramePositions {
  return {
    x: (value: number) => widthPt * fractionAlong(x, value),
    y: (value: number) => heightPt * (1 - fractionAlong(y, value)),
  }
}

/** A coordinate as it is written into a path: three decimals of a point, no negative zero. */
export function written(value: number): number {
  const rounded = Math.round(value * 1000) / 1000
  return rounded === 0 ? 0 : rounded
}
