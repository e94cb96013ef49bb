import type { DataTable } from "../figure-kind"
import { decayExponentParams, type DecayExponentParams } from "./params"

/** Distinct values up to which a parameter column splits into curves unasked. */
const fewValues = 8

/**
 * A decay panel to start from: columns by their roles, one curve per value of the first parameter that takes a few
 * values, the fit on the last one and a half decades of time.
 */
export function proposeDecay(
  dataset: string,
  table: DataTable,
  roles: ReadonlyMap<string, string>,
): DecayExponentParams {
  const named = (role: string) => table.columns.find((column) => roles.get(column.name) === role)?.name
  const distinct = (name: string) =>
    new Set<number | string>(table.columns.find((column) => column.name === name)?.values ?? []).size
  const parameters = table.columns
    .filter((column) => roles.get(column.name) === "parameter")
    .map((c) => c.name)
  const curveBy = parameters.find((name) => distinct(name) > 1 && distinct(name) <= fewValues) ?? null
  const time = table.columns.find((column) => column.name === named("time"))
  const last = time?.values instanceof Float64Array ? time.values.reduce((a, b) => (b > a ? b : a), 0) : 0
  const columns = Object.fromEntries(
    (["trajectory", "time", "observable", "uncertainty", "weight"] as const).flatMap((role) => {
      const name = named(role)
      return name === undefined ? [] : [[role, name]]
    }),
  )
  return decayExponentParams.parse({
    kind: "decay-exponent",
    data: { dataset, columns, curveBy },
    reduction: { bins: { perDecade: 12 } },
    fit: { window: last > 0 ? [Number((last / 10 ** 1.5).toPrecision(2)), null] : [null, null] },
  })
}
