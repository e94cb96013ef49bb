import { IntakeRefusal } from "../intake-codes"
import { IntakeJournal } from "../intake-journal"
import { finishColumns } from "../columns/finish-columns"
import type { OutputColumn } from "../columns/output-column"
import { describeColumns } from "../columns/describe-columns"
import { OrderWatch } from "../columns/order-watch"
import type { ReadContext } from "../read-context"
import type { LineAccount, TableReading } from "../table-reading"
import { type FieldKind, fieldKind } from "./column-evidence"
import { FieldColumn } from "./field-column"
import { LineBuffer } from "./line-buffer"
import { type PlanRevision, type TextDecision, planText } from "./plan-text"
import { previewText } from "./preview-text"
import { reportText } from "./report-text"
import { RowReader } from "./row-reader"
import { plannedColumns } from "./text-plan"
import { type TextSurvey, surveyText } from "./survey-text"
import { asUtf8 } from "./text-encoding"
import { textOutputs } from "./text-outputs"
import { textRecipe } from "./text-recipe"

/** Bytes of the beginning that the decisions are made from; more when these hold hardly a row. */
const HEAD_BYTES = 1024 * 1024
const LARGEST_HEAD = 32 * 1024 * 1024
const FEWEST_ROWS = 8

/** A text to read: its bytes, unpacked, as often as asked for. */
export interface TextStream {
  open(): AsyncIterable<Uint8Array>
  /** Bytes of the file, packed or not: for progress only. */
  readonly size: number
}

/**
 * Reads a text table in two passes: a survey that decides how, and the reading itself. If the whole file contradicts
 * what its sample promised, it is read once more by what it taught.
 *
 * @throws IntakeRefusal with the code that ends the reading
 * @see docs/intake.md
 */
export async function readText(stream: TextStream, context: ReadContext): Promise<TableReading> {
  const survey = await surveyEnough(stream, context)
  let attempt = await readOnce(stream, survey, {}, context)
  const revision = contradiction(attempt)
  if (revision) {
    context.onRestart?.()
    attempt = await readOnce(stream, survey, revision, context)
  }
  return finish(attempt, survey, context)
}

async function surveyEnough(stream: TextStream, context: ReadContext): Promise<TextSurvey> {
  const { limits, recipe, signal, onProgress } = context
  for (let headBytes = HEAD_BYTES; ; headBytes *= 8) {
    async function* watched() {
      let bytes = 0
      for await (const piece of stream.open()) {
        signal?.throwIfAborted()
        yield piece
        bytes += piece.length
        onProgress?.({ phase: "surveying", bytes, totalBytes: stream.size, rows: 0 })
      }
    }
    const survey = await surveyText(watched, headBytes, limits, recipe.encoding ?? null)
    const rows = survey.head.match(/^[^\S\r\n]*[^\s#%!;/]/gm)?.length ?? 0
    if (survey.complete || rows >= FEWEST_ROWS || headBytes >= LARGEST_HEAD) return survey
  }
}

/** One pass over the file under one plan. */
export interface Attempt {
  readonly decision: TextDecision
  readonly reader: RowReader
  readonly outputs: readonly OutputColumn[]
  readonly journal: IntakeJournal
  readonly watch: OrderWatch
  readonly controlZ: boolean
}

async function readOnce(
  stream: TextStream,
  survey: TextSurvey,
  revision: PlanRevision,
  context: ReadContext,
): Promise<Attempt> {
  const { limits, recipe, signal, onProgress, sink } = context
  const journal = new IntakeJournal(limits.maxListed, context.onProblem)
  const decision = planText(survey, recipe, revision, limits, journal)
  const { plan } = decision
  const fields = plan.fields.map(
    (field) =>
      new FieldColumn(
        field,
        { decimal: plan.decimal, thousands: field.thousands },
        plannedColumns(plan),
        limits,
      ),
  )
  const buffer = new LineBuffer(limits)
  const reader = new RowReader(plan, fields, buffer, journal, limits)
  const outputs = textOutputs(reader, recipe)
  const watch = new OrderWatch(outputs, journal)
  await sink?.start(describeColumns(outputs))
  let part = 0
  const flush = async () => {
    const chunks = outputs.map((output) => output.take(reader.row))
    watch.add(chunks, reader.rowLines)
    if (sink) for (const [index, chunk] of chunks.entries()) await sink.chunk(index, part, chunk)
    part++
    reader.nextPart()
  }
  const readAll = async () => {
    while (reader.run() === "full") await flush()
    const waiting = fields.reduce((sum, { texts }) => sum + (texts?.length ?? 0), 0)
    if (waiting > limits.maxTextBytesPerPart)
      throw new IntakeRefusal("too-much-text", { max: limits.maxTextBytesPerPart })
  }
  let bytes = 0
  for await (const piece of asUtf8(stream.open(), survey)) {
    signal?.throwIfAborted()
    buffer.feed(piece)
    await readAll()
    bytes += piece.length
    onProgress?.({ phase: "reading", bytes, totalBytes: survey.size, rows: reader.keptRows })
  }
  const controlZ = buffer.finish()
  await readAll()
  if (reader.row > 0) await flush()
  return { decision, reader, outputs, journal, watch, controlZ }
}

/** What the whole file says otherwise than the plan, or null. What the recipe fixes is not questioned. */
function contradiction({ reader }: Attempt): PlanRevision | null {
  const { plan, fields, keptRows } = reader
  const kinds = fields.map((field): FieldKind => {
    if (field.plan.kindTold) return field.plan.kind
    const { counts, slowCells } = field
    return fieldKind({ ...counts, numbers: counts.numbers + keptRows - slowCells })
  })
  const changed = kinds.some((kind, index) => kind !== plan.fields[index]!.kind)
  const blocks = reader.segments.blocksSeen
  const blocksMissed = blocks && plan.delimiter === "blank" && plan.segments === null && plan.block === null
  const [other] = [...reader.otherCounts].sort((a, b) => b[1] - a[1])
  if (other && other[1] > keptRows && other[0] > 0) return { fields: other[0], blocks }
  return changed || blocksMissed ? { kinds, blocks } : null
}

function finish(attempt: Attempt, survey: TextSurvey, context: ReadContext): TableReading {
  const { reader, outputs, journal, watch } = attempt
  if (reader.keptRows === 0)
    throw new IntakeRefusal("header-only", {
      names: outputs
        .slice(0, 10)
        .map(({ name }) => name)
        .join(", "),
    })
  reportText(attempt, survey)
  watch.finish()
  const columns = finishColumns(outputs, (index) => watch.factsOf(index), journal)
  return {
    format: "text",
    recipe: textRecipe(attempt, survey, columns, context.recipe),
    columns,
    rows: reader.keptRows,
    lineAccount: accountFor(reader),
    preview: previewText(attempt, survey),
    metadata: reader.comments.metadata,
    notes: journal.notes,
    problems: journal.problems,
    problemCounts: journal.problemCounts,
    asks: journal.asks,
    refused: null,
  }
}

/** Nothing is dropped in silence: the kinds of lines must add up to the lines that were passed. */
function accountFor({ lines, buffer }: RowReader): LineAccount {
  const physical = buffer.ends.lf + buffer.ends.crlf + buffer.ends.cr + (buffer.hasFinalNewline ? 0 : 1)
  const found = Object.values(lines).reduce((sum, count) => sum + count, 0)
  if (found !== physical) throw new IntakeRefusal("line-account", { n: found, max: physical })
  return { physical, ...lines }
}
