import type { ColumnReading } from "../table-reading"
import { recipeColumn } from "../columns/recipe-column"
import type { ReadingRecipe, RecipeInput } from "../reading-recipe"
import type { Attempt } from "./read-text"
import type { TextSurvey } from "./survey-text"

/** The recipe by which a text was read; null stands where an open question has to be answered. */
export function textRecipe(
  { decision, outputs, journal }: Pick<Attempt, "decision" | "outputs" | "journal">,
  survey: TextSurvey,
  columns: readonly ColumnReading[],
  told: RecipeInput,
): ReadingRecipe {
  const { plan } = decision
  const open = new Set(journal.asks.map(({ code }) => code))
  return {
    version: 1,
    entry: told.entry ?? null,
    encoding: survey.encoding,
    delimiter: open.has("delimiter-unsure") ? null : plan.delimiter,
    decimal: open.has("decimal-ambiguous") || open.has("delimiter-unsure") ? null : plan.decimal,
    comments: plan.comments,
    commentPrefixes: plan.prefixes,
    headerLines: open.has("header-guessed") || open.has("header-count-mismatch") ? null : plan.headerLines,
    fields: open.has("delimiter-unsure") ? null : plan.fields.length,
    trailingDelimiter: plan.trailingDelimiter,
    skipLines: plan.skipLines,
    padShortRows: plan.padShortRows,
    segments: plan.segments,
    block: plan.block,
    tables: null,
    columns: open.has("delimiter-unsure")
      ? null
      : columns.map((column, index) => recipeColumn(column, outputs[index]!.told)),
  }
}
