import type { SentenceValues } from "../intake-codes"
import { IntakeRefusal } from "../intake-codes"
import type { IntakeJournal } from "../intake-journal"
import type { IntakeLimits } from "../intake-limits"
import { readCell } from "../numbers/read-cell"
import { uniqueNames } from "../names/column-names"
import { splitUnit } from "../names/split-unit"
import type { RecipeColumn, RecipeInput } from "../reading-recipe"
import { type DelimiterDecision, chooseDelimiter } from "./choose-delimiter"
import { type HeaderChoice, chooseHeader } from "./choose-header"
import { type FieldKind, countCell, fieldKind, noCounts } from "./column-evidence"
import { squeezed } from "./comment-reader"
import { metadataOf } from "./metadata-line"
import { type SampleTable, commentPrefix, defaultPrefixes, sampleLines } from "./sample-lines"
import type { TextSurvey } from "./survey-text"
import type { FieldPlan, TextPlan } from "./text-plan"

/** What the whole file taught when it contradicted the plan made from its sample. */
export interface PlanRevision {
  readonly fields?: number
  readonly kinds?: readonly FieldKind[]
  readonly blocks?: boolean
}

export interface TextDecision {
  readonly plan: TextPlan
  readonly delimiter: DelimiterDecision
  readonly header: HeaderChoice
  /** First rows of the sample without the header, for the preview. */
  readonly sample: SampleTable
}

/**
 * Decides how to read a text from its sample. What the recipe says is taken; what it leaves open is found out.
 *
 * @param journal told of names that need a look
 * @throws IntakeRefusal too-many-columns, header-only
 * @see docs/intake.md, Order of decisions
 */
export function planText(
  survey: TextSurvey,
  recipe: RecipeInput,
  revision: PlanRevision,
  limits: IntakeLimits,
  journal: IntakeJournal,
): TextDecision {
  const lines = sampleLines(survey)
  const skipped = (line: number | null) =>
    line !== null && (recipe.skipLines ?? []).some(([from, to]) => line >= from && line <= to)
  const first = lines.first.map((entry) => (skipped(entry.line) ? { ...entry, text: "" } : entry))
  const prefixes = recipe.commentPrefixes ?? defaultPrefixes
  const delimiter = chooseDelimiter({ first, later: lines.later }, prefixes, recipe, limits)
  const trailing = recipe.trailingDelimiter ?? (delimiter.delimiter !== "blank" && endsEmpty(delimiter.table))
  const fields = revision.fields ?? recipe.fields ?? delimiter.fields - (trailing ? 1 : 0)
  const style = { decimal: delimiter.decimal }
  const told = recipe.headerLines ?? null
  const sample = trailing ? withoutLast(delimiter.table, fields) : delimiter.table
  const header = chooseHeader({ table: sample, fields, delimiter: delimiter.delimiter, style }, told)
  const headerLines = [header.line, header.unitsLine].filter((line) => line !== null)
  const rows = sample.rows.filter(({ line }) => line === null || !headerLines.includes(line))
  if (rows.length === 0 && survey.complete)
    throw new IntakeRefusal("header-only", {
      names: (header.names ?? []).slice(0, 10).join(", ") || "no names",
    })
  const topComments = first
    .slice(0, (sample.rows[0]?.line ?? 1) - 1)
    .some(({ text }) => commentPrefix(text, prefixes, delimiter.delimiter) !== null)
  const blocks = revision.blocks ?? (delimiter.delimiter === "blank" && hasBlocks(first))
  const plan: TextPlan = {
    delimiter: delimiter.delimiter,
    decimal: delimiter.decimal,
    prefixes,
    comments: recipe.comments ?? (delimiter.delimiter === "blank" || topComments ? "anywhere" : "top"),
    trailingDelimiter: trailing,
    fields: [],
    headerLines,
    headerText: header.text === null ? null : squeezed(header.text),
    skipLines: recipe.skipLines ?? [],
    padShortRows: recipe.padShortRows ?? false,
    segments:
      recipe.segments ?? (blocks && recipe.block == null ? { by: "two-blank-lines", column: "block" } : null),
    block: recipe.block ?? null,
  }
  const kinds = revision.kinds ?? sampleKinds({ ...sample, rows }, fields, style)
  const named = nameFields(header, fields, sample, journal)
  const inRecipe = recipeOfFields(recipe.columns ?? null, kinds, plan.segments !== null)
  return {
    plan: { ...plan, fields: named.map((field, index) => planField(field, kinds[index]!, inRecipe[index])) },
    delimiter,
    header,
    sample: { ...sample, rows },
  }
}

function planField(
  { name, unit }: { name: string; unit: string | null },
  found: FieldKind,
  told: Partial<RecipeColumn> | undefined,
): FieldPlan {
  const complex = found === "complex" && told?.kind !== "text"
  return {
    name: complex || told?.name == null ? name : told.name,
    unit: told?.unit ?? unit,
    kind: complex ? "complex" : (told?.kind ?? found),
    kindTold: told?.kind != null,
    thousands: told?.thousands ?? null,
    sentinels: told?.sentinels ?? null,
  }
}

/** The recipe names columns; a complex field has two of them, of which the first speaks for both. */
function recipeOfFields(
  columns: RecipeInput["columns"] | null,
  kinds: readonly FieldKind[],
  leading: boolean,
): (Partial<RecipeColumn> | undefined)[] {
  if (!columns) return []
  let at = leading ? 1 : 0
  return kinds.map((kind) => {
    const told = columns[at]
    at += kind === "complex" && told?.kind !== "text" ? 2 : 1
    return told
  })
}

function endsEmpty({ rows }: SampleTable): boolean {
  const [first, ...body] = rows
  const isEmpty = ({ fields }: (typeof rows)[number]) => fields.at(-1)?.text === "" && !fields.at(-1)!.quoted
  if (!first || body.length === 0 || !body.every((row) => row.fields.length > 1 && isEmpty(row))) return false
  return isEmpty(first) || first.fields.length === body[0]!.fields.length - 1
}

function withoutLast(table: SampleTable, fields: number): SampleTable {
  const rows = table.rows.map((row) =>
    row.fields.length === fields + 1 ? { ...row, fields: row.fields.slice(0, fields) } : row,
  )
  return { ...table, rows }
}

function hasBlocks(lines: readonly { readonly text: string }[]): boolean {
  let run = 0
  let rows = false
  for (const { text } of lines) {
    if (text.trim() === "") run++
    else {
      if (commentPrefix(text, defaultPrefixes, "blank") === null) {
        if (rows && run >= 2) return true
        rows = true
      } else if (run >= 2 && rows) continue
      run = 0
    }
  }
  return false
}

function sampleKinds({ rows }: SampleTable, fields: number, style: { decimal: "." | "," }): FieldKind[] {
  const counts = Array.from({ length: fields }, noCounts)
  for (const row of rows)
    if (row.fields.length === fields)
      row.fields.forEach(({ text }, field) => countCell(counts[field]!, readCell(text, style)))
  return counts.map(fieldKind)
}

/** Names of the fields with their units, told apart and checked. */
function nameFields(
  header: HeaderChoice,
  fields: number,
  sample: SampleTable,
  journal: IntakeJournal,
): { name: string; unit: string | null }[] {
  if (!header.names) {
    const matrix = sample.comments.map(({ text }) => metadataOf(text)).find((entry) => entry?.key === "name")
    return Array.from({ length: fields }, (_, field) => ({
      name: matrix ? `${matrix.value}.${field + 1}` : `column_${field + 1}`,
      unit: null,
    }))
  }
  const parts = header.names.map(splitUnit)
  const found = parts.filter(({ by }) => by !== null).length
  if (found > 0) journal.note("unit-in-header", { n: found })
  for (const { name, unit, by } of parts)
    if (by === "suffix") journal.note("unit-from-suffix", { column: name, unit: unit! })
  const names = uniqueNames(
    parts.map(({ name }) => name),
    (code, column, values: SentenceValues) => journal.problem(code, values, { line: header.line, column }),
  )
  return names.map((name, field) => ({ name, unit: parts[field]!.unit ?? header.units?.[field] ?? null }))
}
