import type { PreviewRow, TableReading } from "../table-reading"
import type { Attempt } from "./read-text"
import { commentPrefix } from "./sample-lines"
import { type Field, splitLine } from "./split-line"
import type { TextSurvey } from "./survey-text"

const ROWS = 10
const MAX_COLUMNS = 256
const MAX_CELL = 120

const shown = (fields: readonly Field[]): string[] =>
  fields.slice(0, MAX_COLUMNS).map(({ text }) => text.slice(0, MAX_CELL))

/** The first and last rows as the file writes them, by field. */
export function previewText({ decision, reader }: Attempt, survey: TextSurvey): TableReading["preview"] {
  const { plan, sample } = decision
  const width = plan.fields.length
  const first = sample.rows
    .filter(({ line, fields }) => line !== null && fields.length === width)
    .slice(0, ROWS)
    .map(({ line, fields }) => ({ line, cells: shown(fields) }))
  const text = survey.complete ? survey.head : survey.tail
  const lines = text.split(/\r\n|\n|\r/)
  if (lines.at(-1) === "") lines.pop()
  const total = reader.buffer.line + reader.buffer.span - 1
  const last: PreviewRow[] = []
  for (let back = 0; back < lines.length - (survey.complete ? 0 : 1) && last.length < ROWS; back++) {
    const line = total - back
    const content = lines[lines.length - 1 - back]!
    if (line <= (first.at(-1)?.line ?? 0)) break
    if (content.trim() === "" || commentPrefix(content, plan.prefixes, plan.delimiter) !== null) continue
    const split = splitLine(content, plan.delimiter)
    const fields = typeof split === "string" ? [] : plan.trailingDelimiter ? split.slice(0, width) : split
    if (fields.length === width) last.unshift({ line, cells: shown(fields) })
  }
  return { first, last }
}
