import { type ArraySource, numberWriter, textWriter } from "../arrays/array-source"
import { readArrays } from "../arrays/read-arrays"
import type { ColumnWriter } from "../columns/column-writer"
import { IntakeRefusal } from "../intake-codes"
import type { IntakeJournal } from "../intake-journal"
import type { IntakeLimits } from "../intake-limits"
import { splitUnit } from "../names/split-unit"
import { readCell } from "../numbers/read-cell"
import type { ReadContext } from "../read-context"
import type { ColumnKind, TableReading } from "../table-reading"
import { LineBuffer } from "../text/line-buffer"
import { Utf8Check, asUtf8 } from "../text/text-encoding"
import { type JsonCell, flatObject } from "./flat-object"

interface KeyCounts {
  numbers: number
  texts: number
  booleans: number
  /** First cells that are no numbers, should the column turn out to be one. */
  readonly strange: { readonly line: number; readonly text: string }[]
}

interface Survey {
  readonly keys: ReadonlyMap<string, KeyCounts>
  readonly rows: number
  readonly setAside: readonly { readonly line: number; readonly text: string }[]
  readonly account: NonNullable<TableReading["lineAccount"]>
}

const BATCH = 4096

/**
 * Reads JSON lines: one flat object a line, each key a column. The first pass learns the keys and their kinds, the second
 * reads the values.
 *
 * @throws IntakeRefusal no-table, too-many-columns, too-many-cells, line-too-long
 * @see docs/intake.md, JSON lines
 */
export async function readJsonLines(
  stream: { readonly name: string; open(): AsyncIterable<Uint8Array> },
  context: ReadContext,
): Promise<TableReading> {
  const survey = await surveyLines(stream.open, context)
  if (survey.rows === 0) throw new IntakeRefusal("no-table")
  const keys = [...survey.keys.keys()]
  const kinds = keys.map((key) => kindOf(survey.keys.get(key)!))
  const source: ArraySource = {
    place: "rows",
    group: "",
    shape: [survey.rows],
    labels: [],
    scales: [],
    outputs: keys.map((key, index) => {
      const { name, unit } = splitUnit(key)
      return { name, unit, symbol: null, longName: null, kind: kinds[index]! }
    }),
    read: (writers) => writeRows(stream.open, keys, kinds, writers, context.limits),
  }
  const report = (journal: IntakeJournal) => reportSurvey(survey, keys, kinds, journal)
  const reading = await readArrays({ format: "json-lines", sources: [source], metadata: [], report }, context)
  return { ...reading, lineAccount: survey.account }
}

async function* linesOf(open: () => AsyncIterable<Uint8Array>, limits: IntakeLimits) {
  const buffer = new LineBuffer(limits)
  for await (const piece of asUtf8(open(), { encoding: "utf-8", mark: 0 })) {
    buffer.feed(piece)
    while (buffer.advance()) yield { line: buffer.line, text: buffer.text.replace(/^\ufeff/, "").trim() }
  }
  buffer.finish()
  while (buffer.advance()) yield { line: buffer.line, text: buffer.text.trim() }
}

async function surveyLines(open: () => AsyncIterable<Uint8Array>, context: ReadContext): Promise<Survey> {
  const { limits, signal } = context
  const keys = new Map<string, KeyCounts>()
  const setAside: { line: number; text: string }[] = []
  const counts = {
    physical: 0,
    rows: 0,
    setAside: 0,
    headers: 0,
    repeatedHeaders: 0,
    comments: 0,
    blanks: 0,
    skipped: 0,
  }
  const utf8 = new Utf8Check()
  async function* checked() {
    for await (const piece of open()) {
      utf8.add(piece)
      yield piece
    }
  }
  for await (const { line, text } of linesOf(checked, limits)) {
    if (line % 10_000 === 0) signal?.throwIfAborted()
    counts.physical++
    const cells = text === "" ? null : flatObject(text)
    if (text === "") counts.blanks++
    else if (!cells) {
      counts.setAside++
      if (setAside.length < limits.maxListed) setAside.push({ line, text })
    } else {
      counts.rows++
      for (const [key, cell] of cells) count(keys, key, cell, line, limits)
      if (keys.size > limits.maxColumns)
        throw new IntakeRefusal(
          "too-many-columns",
          { place: ` up to line ${line}`, max: limits.maxColumns },
          line,
        )
      if (counts.rows * keys.size > limits.maxCells)
        throw new IntakeRefusal("too-many-cells", { n: counts.rows * keys.size, max: limits.maxCells })
    }
  }
  if (!utf8.valid) throw new IntakeRefusal("json-encoding")
  return { keys, rows: counts.rows, setAside, account: counts }
}

function count(
  keys: Map<string, KeyCounts>,
  key: string,
  cell: JsonCell,
  line: number,
  limits: IntakeLimits,
): void {
  let counts = keys.get(key)
  if (!counts) keys.set(key, (counts = { numbers: 0, texts: 0, booleans: 0, strange: [] }))
  if (cell.kind === "number") counts.numbers++
  else if (cell.kind === "boolean") counts.booleans++
  else if (cell.kind === "text") counts.texts++
  if (cell.kind !== "number" && cell.kind !== "missing" && counts.strange.length < limits.maxListed)
    counts.strange.push({
      line,
      text: cell.kind === "text" ? cell.text : cell.value === 1 ? "true" : "false",
    })
}

function kindOf({ numbers, texts, booleans }: KeyCounts): ColumnKind {
  if (booleans > 0 && numbers + texts === 0) return "boolean"
  return 2 * numbers >= numbers + texts + booleans ? "number" : "text"
}

function reportSurvey(
  survey: Survey,
  keys: readonly string[],
  kinds: readonly ColumnKind[],
  journal: IntakeJournal,
): void {
  for (const { line, text } of survey.setAside) journal.problem("json-line", { line }, { line, text })
  journal.more("json-line", survey.account.setAside - survey.setAside.length)
  if (survey.account.blanks > 0) journal.note("blank-lines", { n: survey.account.blanks })
  keys.forEach((key, index) => {
    if (kinds[index] === "text") journal.note("text-column", { column: key })
    if (kinds[index] !== "number") return
    const { texts, booleans, strange } = survey.keys.get(key)!
    for (const { line, text } of strange)
      journal.problem("not-a-number", { line, column: key, text }, { line, column: index + 1, text })
    journal.more("not-a-number", texts + booleans - strange.length)
  })
}

async function writeRows(
  open: () => AsyncIterable<Uint8Array>,
  keys: readonly string[],
  kinds: readonly ColumnKind[],
  writers: readonly ColumnWriter[],
  limits: IntakeLimits,
): Promise<void> {
  let batch: Map<string, JsonCell>[] = []
  const flush = async () => {
    for (const [index, key] of keys.entries())
      await writeColumn(
        batch.map((row) => row.get(key)),
        kinds[index]!,
        writers[index]!,
      )
    batch = []
  }
  for await (const { text } of linesOf(open, limits)) {
    const cells = text === "" ? null : flatObject(text)
    if (cells) batch.push(cells)
    if (batch.length === BATCH) await flush()
  }
  await flush()
}

async function writeColumn(
  cells: readonly (JsonCell | undefined)[],
  kind: ColumnKind,
  writer: ColumnWriter,
): Promise<void> {
  if (kind === "text") {
    const texts = cells.map((cell) => {
      if (!cell || cell.kind === "missing") return null
      return cell.kind === "boolean" ? (cell.value === 1 ? "true" : "false") : cell.text
    })
    return textWriter(writer).write(texts)
  }
  const numbers = numberWriter(writer)
  const missing = cells.map(() => false)
  const values = Float64Array.from(cells, (cell, index) => {
    if (cell?.kind === "boolean" && kind === "boolean") return cell.value
    const read = cell?.kind === "number" && kind === "number" ? readCell(cell.text, { decimal: "." }) : null
    if (read?.kind === "number") {
      if (read.code === "integer-precision") numbers.integer(BigInt(cell!.kind === "number" ? cell!.text : 0))
      return read.value
    }
    missing[index] = true
    return NaN
  })
  await numbers.write(values, (index) => missing[index]!)
}
