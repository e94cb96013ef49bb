import { IntakeRefusal } from "../intake-codes"
import type { ColumnChunk } from "../column-chunk"
import type { NumberBuffer } from "../columns/number-buffer"
import type { NumberSummary } from "../columns/number-summary"
import type { OutputColumn } from "../columns/output-column"
import type { RecipeColumn, RecipeInput } from "../reading-recipe"
import type { ColumnKind } from "../table-reading"
import type { FieldColumn } from "./field-column"
import type { RowReader } from "./row-reader"

/** A column whose parts are taken when they are full. */
export interface TextOutput extends OutputColumn {
  /** Adds the present part to the summary and returns it. */
  take(rows: number): ColumnChunk
}

type Told = Partial<RecipeColumn> | undefined

/**
 * The columns that the fields of a text become: the segment number first, then one for each field, two for a complex one.
 *
 * @throws IntakeRefusal recipe-mismatch when the recipe names another number of columns
 */
export function textOutputs(reader: RowReader, recipe: RecipeInput): TextOutput[] {
  const { plan, fields, segments } = reader
  const made: ((told: Told) => TextOutput)[] = []
  if (plan.segments) {
    const { column } = plan.segments
    made.push((told) => numberOutput(column, null, null, "number", segments.numbers, segments.summary, told))
  }
  fields.forEach((field, index) => {
    const { name, unit } = field.plan
    const place = index + 1
    if (field.texts) made.push((told) => textOutput(field, place, told))
    else if (field.imaginary) {
      const { imaginary } = field
      made.push((told) =>
        numberOutput(`${name}.re`, unit, place, "number", field.numbers, field.summary, told),
      )
      made.push((told) =>
        numberOutput(`${name}.im`, unit, place, "number", imaginary, field.imaginarySummary, told),
      )
    } else {
      const kind = field.plan.kind === "boolean" ? "boolean" : "number"
      made.push((told) => numberOutput(name, unit, place, kind, field.numbers, field.summary, told))
    }
  })
  const told = recipe.columns ?? null
  if (told && told.length !== made.length)
    throw new IntakeRefusal("recipe-mismatch", { k: told.length, n: made.length })
  return made.map((make, index) => make(told?.[index]))
}

function numberOutput(
  name: string,
  unit: string | null,
  place: number | null,
  kind: ColumnKind,
  buffer: NumberBuffer,
  summary: NumberSummary,
  told: Told,
): TextOutput {
  return {
    name: told?.name ?? name,
    unit: told?.unit ?? unit,
    kind,
    symbol: null,
    axes: null,
    longName: null,
    place,
    told,
    take(rows) {
      const values = buffer.values.subarray(0, rows)
      for (const marker of told?.sentinels ?? [])
        for (let row = values.indexOf(marker); row >= 0; row = values.indexOf(marker, row + 1))
          buffer.markMissing(row)
      const chunk = summary.add(values, buffer.validity(rows))
      buffer.clear()
      return chunk
    },
    summary: () => summary.summary,
    sentinels: summary.sentinels,
  }
}

function textOutput(field: FieldColumn, place: number, told: Told): TextOutput {
  const texts = field.texts!
  return {
    name: told?.name ?? field.plan.name,
    unit: told?.unit ?? field.plan.unit,
    kind: field.plan.kind === "datetime" ? "datetime" : "text",
    symbol: null,
    axes: null,
    longName: null,
    place,
    told,
    take() {
      const chunk = texts.chunk()
      texts.clear()
      return field.textSummary.add(chunk)
    },
    summary: () => field.textSummary.summary,
    sentinels: null,
  }
}
