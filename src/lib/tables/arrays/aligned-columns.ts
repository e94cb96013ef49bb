import type { NumberChunk } from "../column-chunk"
import { OrderWatch } from "../columns/order-watch"
import type { OutputColumn } from "../columns/output-column"
import type { IntakeJournal } from "../intake-journal"
import type { TableReading } from "../table-reading"

/** Columns of one length lie side by side: how they move, seen on their first rows. */
export function orderFacts(
  outputs: readonly OutputColumn[],
  watched: ReadonlyMap<string, Float64Array>,
  journal: IntakeJournal,
): (index: number) => ReturnType<OrderWatch["factsOf"]> {
  const found = new Map<number, () => ReturnType<OrderWatch["factsOf"]>>()
  const groups = new Map<number, { output: OutputColumn; index: number }[]>()
  outputs.forEach((output, index) => {
    if (!watched.has(output.name)) return
    const { count } = output.summary()
    groups.set(count, [...(groups.get(count) ?? []), { output, index }])
  })
  for (const group of groups.values()) {
    const watch = new OrderWatch(
      group.map(({ output }) => output),
      journal,
    )
    const chunks = group.map(({ output }): NumberChunk => {
      const values = watched.get(output.name)!
      return { kind: "number", rows: values.length, values, valid: null, min: null, max: null, nanCount: 0 }
    })
    watch.add(chunks, null)
    group.forEach(({ index }, place) => found.set(index, () => watch.factsOf(place)))
  }
  const none = { integers: false, rises: false, steady: false, counts: false }
  return (index) => found.get(index)?.() ?? none
}

/** The first values of columns that lie side by side. */
export function previewColumns(columns: TableReading["columns"]): TableReading["preview"] {
  const rows = Math.max(...columns.map(({ firstValues }) => firstValues.length))
  const shown = columns.slice(0, 256)
  const first = Array.from({ length: rows }, (_, row) => ({
    line: null,
    cells: shown.map(({ firstValues }) => String(firstValues[row] ?? "")),
  }))
  return { first, last: [] }
}
