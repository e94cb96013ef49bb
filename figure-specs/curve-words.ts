import type { CurveKey } from "./figure-kind"

/** How a curve is called in warnings and provenance: "nu = 0.2", or "the curve" when there is only one. */
export function describeCurve(curveBy: string | null, curve: CurveKey): string {
  return curveBy === null || curve === null ? "the curve" : `${curveBy} = ${curve}`
}
