import type { DataTable } from "../figure-kind"
import { proposedColumns, proposedCurveBy } from "../proposal"
import { finiteTimeDivergenceParams, type FiniteTimeDivergenceParams } from "./params"

/** A divergence to start from: columns by their roles, the fit on all times. */
export function proposeDivergence(
  dataset: string,
  table: DataTable,
  roles: ReadonlyMap<string, string>,
): FiniteTimeDivergenceParams {
  return finiteTimeDivergenceParams.parse({
    kind: "finite-time-divergence",
    data: {
      dataset,
      columns: proposedColumns(table, roles, ["trajectory", "time", "observable", "uncertainty", "weight"]),
      curveBy: proposedCurveBy(table, roles),
    },
  })
}
