import type { IntakeJournal } from "../intake-journal"
import type { ReadContext } from "../read-context"
import { NumberWriter, type PartTaker } from "../columns/column-writer"
import { type ArraySource, numberWriter } from "./array-source"
import { axisOrders, nameAxes } from "./name-axes"

/** More columns than this are an array. */
const MOST_COLUMNS = 64

/**
 * Two-dimensional arrays that are tables: those the recipe names become one column each. A lone array that looks like one
 * and has no named axes is asked about.
 *
 * @returns the arrays to read, and those that were asked about
 */
export function asTables(
  sources: readonly ArraySource[],
  recipe: ReadContext["recipe"],
  journal: IntakeJournal,
): { sources: readonly ArraySource[]; asked: ReadonlySet<ArraySource> } {
  const asked = new Set<ArraySource>()
  const alone = !sources.some(({ shape }) => shape.length === 1)
  const read = sources.map((source) => {
    const [rows = 0, columns = 0] = source.shape
    const { kind, name } = source.outputs[0]!
    const fits =
      source.shape.length === 2 && source.outputs.length === 1 && columns <= MOST_COLUMNS && kind === "number"
    if (!fits || recipe.tables?.includes(name)) return fits ? splitColumns(source) : source
    const named = recipe.columns?.some((column) => column.axes != null) ?? false
    if (recipe.tables != null || named || !alone || rows <= columns || !nameAxes(source, sources, null).open)
      return source
    asked.add(source)
    const others = sources.length === 1
    journal.ask(
      "table-or-array",
      { name: source.place, n: columns },
      [
        { label: `A table of ${columns} columns`, recipe: { tables: [name], columns: null } },
        ...(others ? axisOrders(2) : []).map((axes) => ({
          label: `An array: ${axes.join(" × ")}`,
          recipe: { tables: [], columns: [{ axes }] },
        })),
      ],
      { line: source.place },
    )
    return source
  })
  return { sources: read, asked }
}

/** An n x m array as m columns of n values. */
function splitColumns(source: ArraySource): ArraySource {
  const [rows, columns] = source.shape as [number, number]
  const [output] = source.outputs
  return {
    ...source,
    shape: [rows],
    labels: [],
    scales: [],
    outputs: Array.from({ length: columns }, (_, column) => ({
      ...output!,
      name: `${output!.name}.${column + 1}`,
    })),
    async read(writers) {
      let position = 0
      const deal: PartTaker = async (_part, chunk) => {
        if (chunk.kind !== "number") return
        for (let column = 0; column < columns; column++) {
          const start = (column - (position % columns) + columns) % columns
          const values = new Float64Array(Math.max(0, Math.ceil((chunk.rows - start) / columns)))
          for (let row = 0; row < values.length; row++) values[row] = chunk.values[start + row * columns]!
          await numberWriter(writers[column]).write(values)
        }
        position += chunk.rows
      }
      const dealer = new NumberWriter(columns, [], deal)
      await source.read([dealer])
      await dealer.end()
      const first = numberWriter(writers[0])
      first.imprecise = dealer.imprecise
      first.firstImprecise = dealer.firstImprecise
    },
  }
}
