import type { PanelDrawing } from "@specs/chart/drawing"
import type { Spec } from "vega"

/** A specification without its rows, and the rows by table: what changes while a window is dragged is rows alone. */
export interface SplitSpec {
  readonly template: Spec
  readonly tables: ReadonlyMap<string, readonly unknown[]>
}

export function splitData({ spec }: PanelDrawing): SplitSpec {
  const tables = new Map<string, readonly unknown[]>()
  const data = (spec.data ?? []).map((table) => {
    if (!("values" in table) || !Array.isArray(table.values)) return table
    tables.set(table.name, table.values)
    return { ...table, values: [] }
  })
  return { template: { ...spec, data }, tables }
}
