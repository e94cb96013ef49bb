import type { Delimiter } from "../reading-recipe"
import { type Field, splitLine } from "./split-line"
import type { TextSurvey } from "./survey-text"

/** A physical line of the sample; those from the middle and the end of a long file have no number. */
export interface SampleLine {
  readonly line: number | null
  readonly text: string
}

export interface SampleRow extends SampleLine {
  readonly fields: readonly Field[]
}

export interface SampleComment extends SampleLine {
  /** The line without its prefix. */
  readonly rest: string
}

export interface SampleTable {
  readonly rows: readonly SampleRow[]
  /** Comments from the first lines of the file, also those below data. */
  readonly comments: readonly SampleComment[]
}

export const defaultPrefixes = ["#", "%", "!", "//", ";"] as const

const MIDDLE_LINES = 64
const FIRST_ROWS = 256

/** The whole lines of the survey's samples. */
export function sampleLines(survey: TextSurvey): { first: SampleLine[]; later: SampleLine[] } {
  const split = (text: string) => text.split(/\r\n|\n|\r/)
  const head = split(survey.head)
  // The last piece is either empty after a line end or a line that goes on beyond the sample.
  if (!survey.complete || head.at(-1) === "") head.pop()
  const inner = (text: string) => split(text).slice(1, -1)
  const tail = split(survey.tail).slice(1)
  if (tail.at(-1) === "") tail.pop()
  const later = [...inner(survey.middle).slice(0, MIDDLE_LINES), ...tail.slice(-MIDDLE_LINES)]
  return {
    first: head.map((text, index) => ({ line: index + 1, text })),
    later: later.map((text) => ({ line: null, text })),
  }
}

/** The comment prefix that a line begins with, or null. `;` is none where it is the delimiter. */
export function commentPrefix(
  text: string,
  prefixes: readonly string[],
  delimiter: Delimiter,
): string | null {
  const start = text.trimStart()
  return prefixes.find((prefix) => start.startsWith(prefix) && prefix !== delimiter) ?? null
}

/** A comment line without blanks, prefixes and the blanks after them. */
export const commentRest = (text: string): string => text.replace(/^\s*(?:[#%!;*]|\/\/)+[^\S\r\n]*/, "")

/**
 * Splits sample lines into rows and comments under one delimiter. A quoted field may go on over several lines.
 *
 * @param most fields of a row after which splitting stops
 */
export function sampleTable(
  { first, later }: { first: readonly SampleLine[]; later: readonly SampleLine[] },
  delimiter: Delimiter,
  prefixes: readonly string[],
  most: { readonly cells: number; readonly fields: number },
): SampleTable {
  const rows: SampleRow[] = []
  const comments: SampleComment[] = []
  let cells = 0
  const take = (lines: readonly SampleLine[], upTo: number, numbered: boolean) => {
    for (let at = 0; at < lines.length && rows.length < upTo && cells < most.cells; at++) {
      const start = lines[at]!
      if (start.text.trim() === "") continue
      if (commentPrefix(start.text, prefixes, delimiter) !== null) {
        if (numbered) comments.push({ ...start, rest: commentRest(start.text) })
        continue
      }
      let text = start.text
      let fields = splitLine(text, delimiter, most.fields)
      while (fields === "open" && at + 1 < lines.length && text.length < 65_536) {
        text += `\n${lines[++at]!.text}`
        fields = splitLine(text, delimiter, most.fields)
      }
      if (typeof fields === "string") continue
      cells += fields.length
      rows.push({ line: start.line, text, fields })
    }
  }
  take(first, FIRST_ROWS, true)
  const until = rows.length + 2 * MIDDLE_LINES
  cells = Math.min(cells, most.cells / 2)
  take(later, until, false)
  return { rows, comments }
}
