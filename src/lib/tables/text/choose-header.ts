import { type CellStyle, readCell } from "../numbers/read-cell"
import { isKnownUnit, isUnit } from "../names/unit-grammar"
import type { Delimiter } from "../reading-recipe"
import { countCell, fieldKind, noCounts } from "./column-evidence"
import { isMetadata } from "./metadata-line"
import type { SampleRow, SampleTable } from "./sample-lines"
import { type Field, splitLine, trimBlanks } from "./split-line"

/** Where the names stand and what they are, before units are parted from them. */
export interface HeaderChoice {
  /** Null when there is no header, or when the names do not fit the columns. */
  readonly names: readonly string[] | null
  /** Physical line of the names. */
  readonly line: number | null
  /** The text of that line, by which a repeated header is recognised. */
  readonly text: string | null
  readonly from: "comment" | "row" | null
  readonly units: readonly string[] | null
  readonly unitsLine: number | null
  /** The first column holds row names and has no name of its own. */
  readonly indexColumn: boolean
  readonly ask:
    | { readonly code: "header-guessed" }
    | { readonly code: "header-count-mismatch"; readonly found: number }
    | null
}

const none: HeaderChoice = {
  names: null,
  line: null,
  text: null,
  from: null,
  units: null,
  unitsLine: null,
  indexColumn: false,
  ask: null,
}

interface Context {
  readonly table: SampleTable
  readonly fields: number
  readonly delimiter: Delimiter
  readonly style: CellStyle
}

/**
 * Finds the header: a comment line above the data with as many names as columns, or a first row without numbers.
 *
 * @param told physical lines from the recipe: [names, units], [] for no header, null to find out
 * @see docs/intake.md, Header
 */
export function chooseHeader(context: Context, told: readonly number[] | null): HeaderChoice {
  if (told !== null) return toldHeader(context, told)
  const above = commentHeader(context)
  if (above) return above
  const { rows } = context.table
  const [first] = rows
  if (!first || hasNumber(first.fields, context)) return none
  const body = rows.slice(1)
  const texts = namesOfRow(first, context)
  const header = withUnits(
    { ...none, line: first.line, text: first.text, from: "row" as const },
    body,
    context,
  )
  if (texts.length === context.fields) {
    const named = texts.every((name) => name !== "") && new Set(texts).size === texts.length
    const allText = body.length > 0 && numericColumns(body, context).length === 0
    if (allText && !named) return none
    return { ...header, names: texts, ask: allText ? { code: "header-guessed" } : null }
  }
  const quotedIndex = body[0]?.fields[0]?.quoted ?? false
  if (texts.length === context.fields - 1 && (context.delimiter !== "blank" || quotedIndex))
    return { ...header, names: ["row", ...texts], indexColumn: true }
  return { ...header, ask: { code: "header-count-mismatch", found: texts.length } }
}

/** The names of a row; under a blank delimiter a unit in brackets belongs to the name before it. */
function namesOfRow(
  row: { text: string; fields: readonly Field[] },
  { delimiter, fields }: Context,
): string[] {
  if (delimiter === "blank" && !row.fields.some(({ quoted }) => quoted)) return blankNames(row.text, fields)
  const texts = row.fields.map(({ text }) => text.trim())
  // A header may end with the delimiter that its rows end with.
  return texts.length === fields + 1 && texts.at(-1) === "" ? texts.slice(0, -1) : texts
}

/** Names between blanks with their bracketed units; if their number does not fit, names between wide gaps. */
function blankNames(text: string, wanted: number): string[] {
  const joined =
    text.match(/[^\s[(]+(?:\([^()\s]{0,64}\)\S*)?(?:\s*\[[^\]]{0,64}\]|\s+\([^)]{0,64}\))?/g) ?? []
  const names = joined.map((name) => name.trim())
  if (names.length === wanted) return names
  const gaps = trimBlanks(text).split(/\t+|\s{2,}/)
  return gaps.length === wanted ? gaps : names
}

function commentHeader(context: Context): HeaderChoice | null {
  const { table, delimiter, fields } = context
  const [first] = table.rows
  if (!first?.line || !hasNumber(first.fields, context)) return null
  const above = table.comments.filter((comment) => comment.line! < first.line! && !isMetadata(comment.text))
  const last = above.at(-1)
  if (!last) return null
  const split = delimiter === "blank" ? "stray" : splitLine(last.rest, delimiter)
  const byMark = typeof split === "string" ? [] : namesOfRow({ text: last.rest, fields: split }, context)
  const names = byMark.length === fields ? byMark : blankNames(last.rest, fields)
  if (names.length !== fields || names.every((name) => isNumber(name, context.style))) return null
  return { ...none, names, line: last.line, text: last.rest, from: "comment" }
}

function toldHeader(context: Context, lines: readonly number[]): HeaderChoice {
  const [nameLine, unitLine] = lines
  if (nameLine === undefined) return none
  const { table, delimiter, fields } = context
  const row = table.rows.find(({ line }) => line === nameLine)
  const comment = table.comments.find(({ line }) => line === nameLine)
  const rest = row?.text ?? comment?.rest
  if (rest === undefined) return none
  const split = row?.fields ?? splitLine(rest, delimiter)
  const texts = typeof split === "string" ? [] : namesOfRow({ text: rest, fields: split }, context)
  const padded = texts.length === fields - 1 ? ["row", ...texts] : texts
  const names = Array.from({ length: fields }, (_, index) => padded[index] ?? "")
  const unitRow = table.rows.find(({ line }) => line === unitLine)
  return {
    ...none,
    names,
    line: nameLine,
    text: rest,
    from: comment ? "comment" : "row",
    units: unitRow ? unitsOf(unitRow) : null,
    unitsLine: unitLine ?? null,
    indexColumn: texts.length === fields - 1,
  }
}

/** Adds the units of a row below the names that holds nothing but units. */
function withUnits(header: HeaderChoice, body: readonly SampleRow[], context: Context): HeaderChoice {
  const [row, ...below] = body
  if (!row || row.fields.length !== context.fields || below.length === 0) return header
  const numeric = numericColumns(below, context)
  const empty = (text: string) => text === "" || text === "-"
  const fits = row.fields.every(({ text }) => empty(text) || isUnit(text))
  const says = numeric.some((column) => isKnownUnit(row.fields[column]!.text))
  if (!fits || !says || hasNumber(row.fields, context)) return header
  return { ...header, units: unitsOf(row), unitsLine: row.line }
}

const unitsOf = (row: SampleRow): string[] => row.fields.map(({ text }) => (text === "-" ? "" : text))

/** Booleans, nan and inf are names as well: columns are called t, T, f, F. */
function isNumber(text: string, style: CellStyle): boolean {
  const cell = readCell(text, style)
  return cell.kind === "complex" || (cell.kind === "number" && Number.isFinite(cell.value))
}

const hasNumber = (fields: readonly Field[], { style }: Context): boolean =>
  fields.some(({ text, quoted }) => !quoted && isNumber(text, style))

function numericColumns(rows: readonly SampleRow[], { fields, style }: Context): number[] {
  const counts = Array.from({ length: fields }, noCounts)
  for (const row of rows)
    if (row.fields.length === fields)
      row.fields.forEach(({ text }, column) => countCell(counts[column]!, readCell(text, style)))
  return counts.flatMap((count, column) =>
    count.numbers + count.complex > 0 && fieldKind(count) !== "text" ? [column] : [],
  )
}
