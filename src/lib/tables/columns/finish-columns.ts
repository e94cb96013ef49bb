import type { IntakeJournal } from "../intake-journal"
import { proposeRoles } from "../names/propose-roles"
import type { ColumnReading } from "../table-reading"
import { describeColumns } from "./describe-columns"
import type { OrderFacts } from "./order-watch"
import type { OutputColumn } from "./output-column"

/** The columns as they are reported: summaries, proposed roles, and questions about suspicious values. */
export function finishColumns(
  outputs: readonly OutputColumn[],
  factsOf: (index: number) => OrderFacts,
  journal: IntakeJournal,
): ColumnReading[] {
  const summaries = outputs.map((output) => output.summary())
  const roles = proposeRoles(
    outputs.map((output, index) => ({
      name: output.name,
      kind: output.kind,
      place: output.place,
      axes: output.axes,
      told: output.told?.role ?? null,
      facts: factsOf(index),
      summary: summaries[index]!,
    })),
  )
  outputs.forEach(({ name, sentinels, told, place }, index) => {
    if (!sentinels || told?.sentinels != null) return
    for (const { value, count } of sentinels.suspects) {
      const patch = (answer: readonly number[]) => ({
        columns: outputs.map((_, other) => (other === index ? { sentinels: answer } : {})),
      })
      journal.ask(
        "sentinel-suspected",
        { column: name, value, n: count },
        [
          { label: `${value} is a value`, recipe: patch([]) },
          { label: `${value} means missing`, recipe: patch([value]) },
        ],
        { column: place },
      )
    }
  })
  return describeColumns(outputs).map((description, index) => ({
    ...description,
    ...roles[index]!,
    longName: outputs[index]!.longName,
    ...summaries[index]!,
  }))
}
