import type { IntakeJournal } from "../intake-journal"
import { readCell } from "../numbers/read-cell"
import type { MetadataEntry } from "../table-reading"
import { metadataOf } from "./metadata-line"
import { commentPrefix, commentRest } from "./sample-lines"
import { splitLine } from "./split-line"
import type { TextPlan } from "./text-plan"

const MAX_METADATA = 1000

/** The header as it is compared: without prefix, blanks squeezed. */
export const squeezed = (text: string): string => commentRest(text).trim().replace(/\s+/g, " ")

/** Reads the comments of a table: metadata, repeated headers, rows that were commented out, notes after rows. */
export class CommentReader {
  readonly metadata: MetadataEntry[] = []
  readonly commentedRows: number[] = []
  /** Comments at the ends of rows: how many, and the first of them. */
  trailingCount = 0
  readonly trailing: { readonly line: number; readonly text: string }[] = []
  readonly #starts: Set<number>
  /** The header up to its first blank. */
  readonly #headerStart: Buffer
  readonly #lastHeaderLine: number

  constructor(
    readonly plan: TextPlan,
    readonly journal: IntakeJournal,
  ) {
    this.#starts = new Set(plan.prefixes.map((prefix) => prefix.charCodeAt(0)))
    this.#headerStart = Buffer.from(plan.headerText?.split(" ")[0] ?? "")
    this.#lastHeaderLine = Math.max(0, ...plan.headerLines)
  }

  /** Whether a line that begins with this byte may be a comment. */
  mayStart(byte: number): boolean {
    return this.#starts.has(byte)
  }

  isComment(text: string): boolean {
    return commentPrefix(text, this.plan.prefixes, this.plan.delimiter) !== null
  }

  /** Cheap test before {@link repeatsHeader}; the prefix of a commented header has been seen elsewhere. */
  mayRepeatHeader(bytes: Uint8Array, start: number, end: number): boolean {
    let at = start
    while (at < end && (bytes[at] === 32 || bytes[at] === 9)) at++
    const header = this.#headerStart
    let same = 0
    while (same < header.length && bytes[at + same] === header[same]) same++
    return same === header.length && same > 0
  }

  repeatsHeader(text: string, line: number): boolean {
    return (
      this.plan.headerText !== null && line > this.#lastHeaderLine && squeezed(text) === this.plan.headerText
    )
  }

  add(text: string, line: number, block: number | undefined): void {
    const entry = metadataOf(text)
    if (entry) {
      if (this.metadata.length < MAX_METADATA)
        this.metadata.push({ ...entry, place: line, ...(block === undefined ? {} : { block }) })
      return
    }
    const fields = splitLine(commentRest(text), this.plan.delimiter, this.plan.fields.length + 1)
    if (typeof fields === "string" || fields.length !== this.plan.fields.length) return
    const { decimal } = this.plan
    if (fields.every((field) => readCell(field.text, { decimal }).kind === "number"))
      this.commentedRows.push(line)
  }

  /** A comment at the end of a row: cut off and kept as the row's note. */
  addTrailing(text: string, line: number): void {
    this.trailingCount++
    if (this.trailing.length < this.journal.maxListed) this.trailing.push({ line, text: text.slice(0, 200) })
  }
}
