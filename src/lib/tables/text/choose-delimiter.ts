import type { IntakeLimits } from "../intake-limits"
import { IntakeRefusal } from "../intake-codes"
import { readCell } from "../numbers/read-cell"
import type { Delimiter } from "../reading-recipe"
import { type SampleLine, type SampleTable, sampleTable } from "./sample-lines"

export interface DelimiterChoice {
  readonly delimiter: Delimiter
  readonly decimal: "." | ","
  /** The most frequent number of fields. */
  readonly fields: number
  /** Share of rows with that number of fields times share of readable cells. */
  readonly score: number
  readonly table: SampleTable
}

export interface DelimiterDecision extends DelimiterChoice {
  /** Another reading that is as good and gives other values, or null. */
  readonly rival: DelimiterChoice | null
}

/** Ties go to the first: the rarer a mark is in text, the more it says. */
const order: readonly Delimiter[] = ["\\t", ";", "|", ",", "blank"]
/** A text cell counts less than a number, so that a reading that finds numbers wins, and more than the least score. */
const TEXT_WEIGHT = 0.6
const LEAST_SCORE = 0.5
const CLOSE = 0.02
const SAMPLE_CELLS = 40_000

/**
 * Chooses delimiter and decimal mark together, from how regular the rows become and how many cells can be read.
 *
 * @param told what the recipe says; that is not questioned
 * @throws IntakeRefusal too-many-columns, header-only
 * @see docs/intake.md, Delimiter, decimal, quotes
 */
export function chooseDelimiter(
  lines: { first: readonly SampleLine[]; later: readonly SampleLine[] },
  prefixes: readonly string[],
  told: { delimiter?: Delimiter | null; decimal?: "." | "," | null },
  limits: IntakeLimits,
): DelimiterDecision {
  const choices = candidates(lines, prefixes, told, limits)
  let best: DelimiterChoice | null = null
  for (const choice of choices) if (!best || choice.score > best.score + 1e-9) best = choice
  best ??= singleColumn(lines, prefixes, told, limits)
  if (best.fields > limits.maxColumns) {
    const line = best.table.rows[0]?.line ?? 1
    throw new IntakeRefusal("too-many-columns", { place: ` in line ${line}`, max: limits.maxColumns }, line)
  }
  const unsure = told.delimiter == null && best.fields > 1
  const rival = unsure ? findRival(best, choices) : null
  return { ...best, rival }
}

function candidates(
  lines: Parameters<typeof chooseDelimiter>[0],
  prefixes: readonly string[],
  told: Parameters<typeof chooseDelimiter>[2],
  limits: IntakeLimits,
): DelimiterChoice[] {
  const most = { cells: SAMPLE_CELLS, fields: limits.maxColumns + 2 }
  return (told.delimiter ? [told.delimiter] : order).flatMap((delimiter) => {
    const table = sampleTable(lines, delimiter, prefixes, most)
    const fields = modalFields(table)
    if (fields < 2 && !told.delimiter) return []
    const marks = told.decimal ? [told.decimal] : delimiter === "," ? (["."] as const) : ([".", ","] as const)
    return marks.map((decimal) => ({
      delimiter,
      decimal,
      fields: Math.max(1, fields),
      score: scoreOf(table, fields, decimal),
      table,
    }))
  })
}

/** No delimiter splits the lines: one column of whatever they hold. */
function singleColumn(
  lines: Parameters<typeof chooseDelimiter>[0],
  prefixes: readonly string[],
  told: Parameters<typeof chooseDelimiter>[2],
  limits: IntakeLimits,
): DelimiterChoice {
  const most = { cells: SAMPLE_CELLS, fields: limits.maxColumns + 2 }
  const table = sampleTable(lines, "blank", prefixes, most)
  const scores = ([".", ","] as const).map((decimal) => scoreOf(table, 1, decimal))
  const decimal = told.decimal ?? (scores[1]! > scores[0]! ? "," : ".")
  return { delimiter: "blank", decimal, fields: 1, score: 1, table }
}

/** Of the rows below the first, which may be a header with a count of its own; ties go to the larger. */
export function modalFields({ rows }: SampleTable): number {
  const counts = new Map<number, number>()
  for (const { fields } of rows.length > 1 ? rows.slice(1) : rows)
    counts.set(fields.length, (counts.get(fields.length) ?? 0) + 1)
  const [most] = [...counts].sort((a, b) => b[1] - a[1] || b[0] - a[0])
  return most?.[0] ?? 0
}

function scoreOf({ rows }: SampleTable, fields: number, decimal: "." | ","): number {
  const regular = rows.filter((row) => row.fields.length === fields)
  const body = regular.filter((row) => row !== rows[0])
  if (rows.length === 0) return 0
  let readable = 0
  let cells = 0
  for (let column = 0; column < fields; column++) {
    let good = 0
    let bad = 0
    for (const row of body) {
      const { text, quoted } = row.fields[column]!
      if (readCell(text, { decimal }).kind === "bad" && !quoted) bad++
      else good++
    }
    readable += bad > good ? good + TEXT_WEIGHT * bad : good
    cells += good + bad
  }
  return (regular.length / rows.length) * (cells > 0 ? readable / cells : 0.5)
}

function findRival(best: DelimiterChoice, choices: readonly DelimiterChoice[]): DelimiterChoice | null {
  const others = choices.filter(
    (choice) =>
      choice !== best &&
      (best.score < LEAST_SCORE || choice.score > best.score - CLOSE) &&
      !sameValues(best, choice),
  )
  return others.sort((a, b) => b.score - a.score)[0] ?? null
}

/** Whether two readings of the first rows give the same values. */
function sameValues(a: DelimiterChoice, b: DelimiterChoice): boolean {
  if (a.fields !== b.fields) return false
  const values = ({ table, decimal }: DelimiterChoice) =>
    JSON.stringify(
      table.rows.slice(0, 20).map(({ fields }) =>
        fields.map(({ text }) => {
          const cell = readCell(text, { decimal })
          return cell.kind === "number" ? String(cell.value) : cell.kind === "missing" ? null : text
        }),
      ),
    )
  return values(a) === values(b)
}
