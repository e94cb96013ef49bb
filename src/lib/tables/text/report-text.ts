import type { IntakeJournal } from "../intake-journal"
import type { RecipeInput } from "../reading-recipe"
import type { Attempt } from "./read-text"
import type { DelimiterChoice } from "./choose-delimiter"
import type { FieldColumn } from "./field-column"
import type { TextSurvey } from "./survey-text"

/** Says how a text was read: notes, and the questions that only the user can answer. */
export function reportText(attempt: Attempt, survey: TextSurvey): void {
  reportLines(attempt, survey)
  reportHeader(attempt)
  reportDelimiter(attempt)
  reportComments(attempt)
  const { fields, parser } = attempt.reader
  fields.forEach((field, index) => reportField(field, parser.longValues[index]!, attempt.journal))
}

function reportLines({ reader, journal, controlZ }: Attempt, survey: TextSurvey): void {
  const { buffer, lines } = reader
  const { crlf, cr, lf } = buffer.ends
  const names = reader.fields.map(({ plan }) => plan.name).join(", ")
  if (survey.mark > 0 && survey.encoding === "utf-8") journal.note("bom")
  if (survey.encoding.startsWith("utf-16")) journal.note("utf-16")
  if (survey.encodingGuessed)
    journal.problem("encoding-guessed", { encoding: survey.encoding, names }, { line: 1 })
  if (crlf > 0 && lf === 0) journal.note("crlf")
  if (crlf > 0 && lf > 0) journal.note("mixed-line-ends", { n: crlf })
  if (cr > 0 && lf + crlf === 0) journal.note("cr-line-ends")
  if (cr > 0 && lf + crlf > 0)
    for (const line of buffer.strayCarriageReturns) journal.problem("stray-cr", { line }, { line })
  if (!buffer.hasFinalNewline) journal.note("no-final-newline")
  if (controlZ) journal.note("control-z")
  if (lines.blanks > 0) journal.note("blank-lines", { n: lines.blanks })
  if (reader.quotedBreaks > 0) journal.note("quoted-line-break", { n: reader.quotedBreaks })
  if (reader.paddedRows > 0) journal.note("padded-rows", { n: reader.paddedRows })
}

function reportHeader({ decision, journal }: Attempt): void {
  const { header, plan } = decision
  const { line } = header
  if (header.from === "comment") journal.note("comment-header", { line: line! })
  if (header.indexColumn) journal.note("index-column")
  if (header.unitsLine !== null && header.units) journal.note("units-row", { line: header.unitsLine })
  if (header.names === null && header.ask === null) journal.note("no-header")
  if (header.ask?.code === "header-guessed")
    journal.ask(
      "header-guessed",
      { line: line! },
      [
        { label: "Yes, these are names", recipe: { headerLines: [line!] } },
        { label: "No, it is a row", recipe: { headerLines: [] } },
      ],
      { line },
    )
  if (header.ask?.code === "header-count-mismatch")
    journal.ask(
      "header-count-mismatch",
      { k: header.ask.found, n: plan.fields.length },
      [
        { label: `Take line ${line} as names, from the left`, recipe: { headerLines: [line!] } },
        {
          label: `Skip line ${line}; the columns are numbered`,
          recipe: { headerLines: [], skipLines: [[line!, line!]] },
        },
      ],
      { line },
    )
}

function reportDelimiter({ decision, reader, journal }: Attempt): void {
  const { delimiter, plan } = decision
  if (plan.fields.length === 1) journal.note("single-column")
  if (plan.trailingDelimiter) journal.note("trailing-delimiter")
  if (delimiter.rival) {
    const { rival } = delimiter
    journal.ask("delimiter-unsure", {}, [delimiter, rival].map(readingChoice), { line: 1 })
    return
  }
  if (plan.decimal !== ",") return
  const numeric = reader.fields.filter(
    ({ plan: field }) => field.kind === "number" || field.kind === "complex",
  )
  if (reader.parser.commaProved || numeric.length === 0) {
    if (reader.parser.commaProved) journal.note("decimal-comma")
    return
  }
  const sample = decision.sample.rows
    .flatMap(({ fields }) => fields)
    .find(({ text }) => /^[+-]?\d{1,3},\d{3}$/.test(text))
  if (!sample) return
  const { text } = sample
  journal.ask("decimal-ambiguous", { text, a: text.replace(",", "."), b: text.replace(",", "") }, [
    { label: `${text} is ${text.replace(",", ".")}`, recipe: { decimal: "," } },
    {
      label: `${text} is ${text.replace(",", "")}`,
      recipe: { decimal: ".", columns: reader.fields.map(() => ({ thousands: "," as const })) },
    },
  ])
}

function readingChoice({ delimiter, decimal, table }: DelimiterChoice): {
  label: string
  recipe: RecipeInput
} {
  const words = { ",": "commas", ";": "semicolons", "|": "bars", "\\t": "tabs", blank: "blanks" }
  const rows = table.rows.slice(0, 3).map(({ fields }) =>
    fields
      .slice(0, 12)
      .map(({ text }) => text.slice(0, 40))
      .join(" ¦ "),
  )
  return {
    label: `Split at ${words[delimiter]}, decimal ${decimal === "," ? "comma" : "point"}: ${rows.join(" / ")}`,
    recipe: { delimiter, decimal },
  }
}

function reportComments({ decision, reader, journal }: Attempt): void {
  const { comments, segments } = reader
  const { plan } = decision
  if (comments.metadata.length > 0) journal.note("metadata", { n: comments.metadata.length })
  if (comments.commentedRows.length > 0)
    journal.note(
      "commented-rows",
      { n: comments.commentedRows.length, line: comments.commentedRows[0]! },
      { lines: comments.commentedRows.slice(0, 1000) },
    )
  if (comments.trailingCount > 0)
    journal.note(
      "trailing-comment",
      { n: comments.trailingCount },
      { lines: comments.trailing.map(({ line }) => line), texts: comments.trailing.map(({ text }) => text) },
    )
  const n = segments.segment + 1
  if (plan.segments?.by === "two-blank-lines")
    journal.note("block-column", { n, column: plan.segments.column })
  else if (plan.segments) journal.note("segment-column", { n, column: plan.segments.column })
  if (segments.foreignBlocks.size > 0 && plan.block === null)
    journal.ask(
      "blocks-differ",
      { counts: [plan.fields.length, ...new Set(segments.foreignBlocks.values())].join(", ") },
      [
        { label: `Rows of ${plan.fields.length} columns`, recipe: { fields: plan.fields.length } },
        ...[...segments.foreignBlocks].slice(0, 20).map(([block, fields]) => ({
          label: `Block ${block}, of ${fields} columns`,
          recipe: { block, fields, headerLines: [], segments: null, columns: null },
        })),
      ],
    )
  declaredSize(reader, journal)
}

/** Octave writes how many rows and columns follow. */
function declaredSize({ comments, keptRows, plan }: Attempt["reader"], journal: IntakeJournal): void {
  const declared = (key: string) => comments.metadata.find((entry) => entry.key === key)
  if (!declared("name") || declared("type")?.value !== "matrix") return
  for (const [key, found] of [
    ["rows", keptRows],
    ["columns", plan.fields.length],
  ] as const) {
    const entry = declared(key)
    if (entry && Number(entry.value) !== found)
      journal.problem(
        "declared-size-differs",
        { declared: `${entry.value} ${key}`, found },
        { line: entry.place },
      )
  }
}

function reportField(field: FieldColumn, longValues: number, journal: IntakeJournal): void {
  const { name: column, kind } = field.plan
  if (kind === "text" || kind === "datetime") journal.note("text-column", { column })
  if (kind === "complex") journal.note("complex-split", { column, re: `${column}.re`, im: `${column}.im` })
  for (const [code, n] of field.notes) journal.note(code, { column, n })
  if (longValues > 0) journal.note("digits-beyond-double", { column, n: longValues })
  if (field.missingWords.size > 0)
    journal.note("missing-words", {
      column,
      n: [...field.missingWords.values()].reduce((sum, count) => sum + count, 0),
      words: [...field.missingWords.keys()].join(", "),
    })
}
