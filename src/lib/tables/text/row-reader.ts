import { type IntakeCodeName, IntakeRefusal, type SentenceValues } from "../intake-codes"
import type { IntakeJournal } from "../intake-journal"
import { type IntakeLimits, ROWS_PER_PART } from "../intake-limits"
import { CommentReader } from "./comment-reader"
import { type FieldColumn } from "./field-column"
import type { LineBuffer } from "./line-buffer"
import { openQuote } from "./quoted-span"
import { NEEDS_SPLITTER, RowParser } from "./row-parser"
import { SegmentCounter } from "./segment-counter"
import { type Field, delimiterText, splitLine, trimBlanks } from "./split-line"
import { type TextPlan, plannedColumns } from "./text-plan"

/**
 * Reads lines into columns by a plan. Every physical line ends in exactly one of the counts of `lines`. `run` stops when
 * a part is full; the caller then empties the columns and goes on.
 */
export class RowReader {
  /** Rows in the present part, and their lines. */
  row = 0
  readonly rowLines = new Uint32Array(ROWS_PER_PART)
  readonly lines = {
    rows: 0,
    setAside: 0,
    headers: 0,
    repeatedHeaders: 0,
    comments: 0,
    blanks: 0,
    skipped: 0,
  }
  readonly parser: RowParser
  readonly comments: CommentReader
  readonly segments: SegmentCounter
  /** Rows that were set aside, by their number of fields. */
  readonly otherCounts = new Map<number, number>()
  keptRows = 0
  paddedRows = 0
  quotedBreaks = 0
  readonly #values: readonly Float64Array[]
  #blankRun = 0
  readonly #delimiter: number
  readonly #maxRows: number

  constructor(
    readonly plan: TextPlan,
    readonly fields: readonly FieldColumn[],
    readonly buffer: LineBuffer,
    readonly journal: IntakeJournal,
    readonly limits: IntakeLimits,
  ) {
    this.parser = new RowParser(plan)
    this.segments = new SegmentCounter(plan, limits)
    this.comments = new CommentReader(plan, journal)
    this.#values = fields.map(({ numbers }) => numbers.values)
    this.#delimiter = plan.delimiter === "blank" ? 32 : delimiterText(plan.delimiter).charCodeAt(0)
    this.#maxRows = Math.floor(limits.maxCells / plannedColumns(plan))
  }

  /** Reads until the part is full ("full") or more bytes are needed ("more"). */
  run(): "full" | "more" {
    while (this.row < ROWS_PER_PART) {
      if (!this.buffer.advance()) return "more"
      if (!this.#line()) return "more"
    }
    return "full"
  }

  /** Starts a new part. */
  nextPart(): void {
    this.row = 0
  }

  /** One line; false when its end lies beyond the bytes at hand. */
  #line(): boolean {
    const { buffer, plan, lines } = this
    const { line, bytes } = buffer
    let first = buffer.start
    while (first < buffer.end && (bytes[first] === 32 || bytes[first] === 9)) first++
    if (plan.skipLines.length > 0 && plan.skipLines.some(([from, to]) => line >= from && line <= to))
      lines.skipped++
    else if (plan.headerLines.includes(line)) {
      if (buffer.hasQuote && !this.#closeQuotes()) return false
      lines.headers += buffer.span
    } else if (first === buffer.end) {
      lines.blanks++
      this.#blankRun++
      return true
    } else if (this.#isComment(bytes[first]!)) this.#comment()
    else {
      if (buffer.hasQuote && !this.#closeQuotes()) return false
      this.segments.afterBlankLines(this.#blankRun)
      this.#row()
    }
    this.#blankRun = 0
    return true
  }

  #isComment(first: number): boolean {
    if (!this.comments.mayStart(first)) return false
    const text = this.buffer.text
    if (!this.comments.isComment(text)) return false
    if (this.plan.comments === "anywhere" || this.lines.rows === 0) return true
    const fields = splitLine(text, this.plan.delimiter)
    return typeof fields === "string" || fields.length !== this.plan.fields.length
  }

  #comment(): void {
    const { buffer, lines, plan } = this
    const { line, text } = buffer
    this.segments.blankLinesBefore(this.#blankRun)
    if (this.comments.repeatsHeader(text, line)) {
      lines.repeatedHeaders++
      this.segments.headerRepeated()
      this.journal.problem("repeated-header", { line }, { line, text })
      return
    }
    lines.comments++
    const { upcoming } = this.segments
    this.comments.add(text, line, plan.segments?.by === "two-blank-lines" ? upcoming : undefined)
    if (plan.comments === "top" && lines.rows > 0)
      this.journal.problem("comment-midfile", { line }, { line, text })
  }

  /** Joins lines while a quote is open; false when more bytes are needed. */
  #closeQuotes(): boolean {
    const { buffer, limits } = this
    let open = openQuote(buffer.bytes, buffer.start, buffer.end, this.#delimiter, -1)
    while (open >= 0) {
      const from = buffer.end
      const extended = buffer.extend()
      if ((!extended && buffer.ended) || buffer.end - open > limits.maxQuotedBytes)
        throw new IntakeRefusal(...this.#openedQuote(open))
      if (!extended) {
        buffer.rewind()
        return false
      }
      open = openQuote(buffer.bytes, from, buffer.end, this.#delimiter, open)
    }
    return true
  }

  #openedQuote(open: number): [IntakeCodeName, SentenceValues, number, number] {
    const { buffer } = this
    const before = buffer.bytes.toString("utf8", buffer.start, open)
    const line = buffer.line + (before.match(/\r\n|\n|\r/g)?.length ?? 0)
    const fields = splitLine(before, this.plan.delimiter)
    const column = typeof fields === "string" ? 1 : fields.length
    return ["quote-not-closed", { line }, line, Math.max(1, column)]
  }

  #row(): void {
    const { buffer, plan, parser } = this
    if (this.segments.excluded) {
      this.lines.skipped += buffer.span
      return
    }
    const count = parser.parse(buffer.bytes, buffer.start, buffer.end, this.#values, this.row)
    if (count === NEEDS_SPLITTER) return this.#splitRow()
    const trailing = plan.trailingDelimiter && count === plan.fields.length + 1 && this.#endsWithDelimiter()
    const found = trailing ? count - 1 : count
    if (found !== plan.fields.length && !this.#padded(found)) return this.#setAside(count)
    if (parser.slow > 0 && this.#repeatsHeader()) return
    if (parser.commentAt >= 0)
      this.comments.addTrailing(buffer.bytes.toString("utf8", parser.commentAt, buffer.end), buffer.line)
    for (let slow = 0; slow < parser.slow; slow++) {
      const text = buffer.bytes.toString("utf8", parser.slowStart[slow]!, parser.slowEnd[slow]!)
      this.#cell(parser.slowField[slow]!, parser.slowQuoted[slow] ? text : trimBlanks(text))
    }
    for (let field = found; field < plan.fields.length; field++) this.#cell(field, "")
    this.#kept()
  }

  /** The general way: quotes, brackets, blanks outside ASCII. */
  #splitRow(): void {
    const { buffer, plan } = this
    let fields = splitLine(buffer.text, plan.delimiter, this.limits.maxColumns + 2)
    if (typeof fields === "string") {
      this.lines.setAside += buffer.span
      this.journal.problem("quote-stray", { line: buffer.line }, { line: buffer.line, text: buffer.text })
      return
    }
    const comment =
      plan.delimiter === "blank" ? fields.findIndex(({ text, quoted }) => !quoted && text[0] === "#") : -1
    if (comment >= 0) fields = fields.slice(0, comment)
    const last: Field | undefined = fields.at(-1)
    if (
      plan.trailingDelimiter &&
      fields.length === plan.fields.length + 1 &&
      last!.text === "" &&
      !last!.quoted
    )
      fields = fields.slice(0, -1)
    if (fields.length !== plan.fields.length && !this.#padded(fields.length))
      return this.#setAside(fields.length)
    if (this.#repeatsHeader()) return
    if (comment >= 0) this.comments.addTrailing(buffer.text.slice(buffer.text.indexOf("#")), buffer.line)
    plan.fields.forEach((_, field) => this.#cell(field, fields[field]?.text ?? ""))
    this.#kept()
  }

  #cell(field: number, text: string): void {
    const column = this.fields[field]!
    if (this.plan.decimal === "," && !this.parser.commaProved && /,(?!\d{3}$)|^[+-]?(?:0|\d{4,}),/.test(text))
      this.parser.commaProved = column.plan.kind === "number"
    column.keep(text, this.row, (code, shown, values) => {
      const { line } = this.buffer
      const place = { line, column: field + 1, text: shown }
      this.journal.problem(code, { line, column: column.plan.name, text: shown, ...values }, place)
    })
  }

  #kept(): void {
    const { buffer, lines } = this
    if (++this.keptRows > this.#maxRows)
      throw new IntakeRefusal("too-many-cells", {
        n: this.keptRows * plannedColumns(this.plan),
        max: this.limits.maxCells,
      })
    this.segments.keep(this.row, this.#values)
    this.rowLines[this.row++] = buffer.line
    lines.rows += buffer.span
    if (buffer.span > 1) this.quotedBreaks++
  }

  #setAside(count: number): void {
    const { buffer, plan } = this
    if (count > this.limits.maxColumns)
      throw new IntakeRefusal(
        "too-many-columns",
        { place: ` in line ${buffer.line}`, max: this.limits.maxColumns },
        buffer.line,
      )
    if (this.#repeatsHeader()) return
    this.lines.setAside += buffer.span
    this.otherCounts.set(count, (this.otherCounts.get(count) ?? 0) + 1)
    this.segments.setAside(count)
    const n = plan.fields.length
    const code = count < n ? "ragged-short" : "ragged-long"
    const text = buffer.bytes.toString("utf8", buffer.start, Math.min(buffer.end, buffer.start + 400))
    this.journal.problem(code, { line: buffer.line, k: count, n }, { line: buffer.line, text })
  }

  #padded(found: number): boolean {
    const { plan } = this
    const pad = plan.padShortRows && plan.delimiter !== "blank" && found < plan.fields.length
    if (pad) this.paddedRows++
    return pad
  }

  #repeatsHeader(): boolean {
    const { buffer, lines } = this
    if (!this.comments.mayRepeatHeader(buffer.bytes, buffer.start, buffer.end)) return false
    const { text, line } = buffer
    if (!this.comments.repeatsHeader(text, line)) return false
    lines.repeatedHeaders += buffer.span
    this.segments.headerRepeated()
    this.journal.problem("repeated-header", { line }, { line, text })
    return true
  }

  #endsWithDelimiter(): boolean {
    const { bytes, start } = this.buffer
    let at = this.buffer.end - 1
    while (at > start && (bytes[at] === 32 || (bytes[at] === 9 && this.#delimiter !== 9))) at--
    return bytes[at] === this.#delimiter
  }
}
