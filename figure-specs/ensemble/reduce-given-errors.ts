import type { ReductionParams } from "../schema/panel-parts"
import { SpecError } from "../spec-error"
import type { ReducedCurve } from "./reduce-curves"

/**
 * Points with errors of their own and no trajectories behind them, in the order of the abscissa.
 *
 * @throws SpecError bad-uncertainty, no-covariance
 */
export function reduceGivenErrors(
  abscissa: Float64Array,
  observable: Float64Array,
  uncertainty: Float64Array,
  { normalise: rule }: ReductionParams,
): Omit<ReducedCurve, "curve" | "where"> {
  const bad = uncertainty.findIndex((sigma) => !(sigma > 0))
  if (bad >= 0)
    throw new SpecError([
      {
        pointer: "/data/columns/uncertainty",
        code: "bad-uncertainty",
        message: `The uncertainty at ${abscissa[bad]} is ${uncertainty[bad]}; every point needs a positive one.`,
      },
    ])
  if (rule === "initial")
    throw new SpecError([
      {
        pointer: "/reduction/normalise",
        code: "no-covariance",
        message:
          "Points with given errors carry no covariance with the first one; divide by a constant instead.",
      },
    ])
  const scale = typeof rule === "object" ? 1 / rule.constant : 1
  const order = Array.from(abscissa.keys()).sort((a, b) => abscissa[a]! - abscissa[b]!)
  return {
    ids: [],
    origin: "given-errors",
    abscissa: Float64Array.from(order, (k) => abscissa[k]!),
    mean: Float64Array.from(order, (k) => observable[k]! * scale),
    standardError: Float64Array.from(order, (k) => uncertainty[k]! * Math.abs(scale)),
    ensemble: null,
    reference: null,
    warnings: [],
  }
}
