import type { DataTable } from "../figure-kind"
import { proposedColumns, proposedCurveBy } from "../proposal"
import { ensembleTraceParams, type EnsembleTraceParams } from "./params"

/** A trace to start from: columns by their roles, one curve per value of a parameter. */
export function proposeTrace(
  dataset: string,
  table: DataTable,
  roles: ReadonlyMap<string, string>,
): EnsembleTraceParams {
  return ensembleTraceParams.parse({
    kind: "ensemble-trace",
    data: {
      dataset,
      columns: proposedColumns(table, roles, ["trajectory", "time", "observable", "uncertainty", "weight"]),
      curveBy: proposedCurveBy(table, roles),
    },
  })
}
