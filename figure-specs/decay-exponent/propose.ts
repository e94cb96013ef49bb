import type { DataTable } from "../figure-kind"
import { distinctValues, proposedColumns, proposedCurveBy } from "../proposal"
import { decayExponentParams, type DecayExponentParams } from "./params"

/**
 * A decay panel to start from: columns by their roles, one curve per value of the first parameter that takes a few
 * values, the fit on the last one and a half decades of time.
 */
export function proposeDecay(
  dataset: string,
  table: DataTable,
  roles: ReadonlyMap<string, string>,
): DecayExponentParams {
  const columns = proposedColumns(table, roles, ["trajectory", "time", "observable", "uncertainty", "weight"])
  const last = columns.time === undefined ? 0 : Number(distinctValues(table, columns.time).at(-1))
  return decayExponentParams.parse({
    kind: "decay-exponent",
    data: { dataset, columns, curveBy: proposedCurveBy(table, roles) },
    reduction: { bins: { perDecade: 12 } },
    fit: { window: last > 0 ? [Number((last / 10 ** 1.5).toPrecision(2)), null] : [null, null] },
  })
}
