import type { Delimiter } from "../reading-recipe"

export interface Field {
  readonly text: string
  readonly quoted: boolean
}

/** A line in fields; `open` when a quote does not end on it, `stray` when text follows a closing quote. */
export type SplitLine = readonly Field[] | "open" | "stray"

/** Blanks of a table: U+00A0, U+202F and U+2009 come from typesetting and locale-aware programs. */
const BLANK = /[ \t\u00a0\u202f\u2009]/
const BLANKS_AROUND = /^[ \t\u00a0\u202f\u2009]+|[ \t\u00a0\u202f\u2009]+$/g
/** Complex numbers as pairs or sums in brackets are one field, whatever stands inside. */
const BRACKETED = /^\([^()"]*\)/
const COMPLEX_IN_BRACKETS = /^\(\s*[-+.\d][^()]*[,+-][^()]*\)$/

export const trimBlanks = (text: string): string => text.replace(BLANKS_AROUND, "")

export const delimiterText = (delimiter: Delimiter): string => (delimiter === "\\t" ? "\t" : delimiter)

/**
 * Splits a row into fields. Quotes count at the start of a field only and are doubled inside; blanks around a field are
 * cut; a run of blanks is one blank delimiter.
 *
 * @param most fields after which the rest of the line is left unread
 * @see RFC 4180, section 2; docs/intake.md, Delimiter, decimal, quotes
 */
export function splitLine(line: string, delimiter: Delimiter, most = Infinity): SplitLine {
  const blank = delimiter === "blank"
  const mark = delimiterText(delimiter)
  const fields: Field[] = []
  let at = 0
  for (;;) {
    while (at < line.length && BLANK.test(line[at]!) && line[at] !== mark) at++
    if ((blank && at >= line.length) || fields.length >= most) return fields
    if (line[at] === '"') {
      const end = closingQuote(line, at)
      if (end < 0) return "open"
      fields.push({ text: line.slice(at + 1, end).replaceAll('""', '"'), quoted: true })
      at = end + 1
      if (blank ? at < line.length && !BLANK.test(line[at]!) : !atDelimiter(line, at, mark)) return "stray"
    } else {
      const end = fieldEnd(line, at, mark, blank)
      fields.push({ text: blank ? line.slice(at, end) : trimBlanks(line.slice(at, end)), quoted: false })
      at = end
    }
    if (blank) continue
    at = line.indexOf(mark, at)
    if (at < 0) return fields
    at++
  }
}

function closingQuote(line: string, open: number): number {
  for (let at = line.indexOf('"', open + 1); at >= 0; at = line.indexOf('"', at + 2))
    if (line[at + 1] !== '"') return at
  return -1
}

function atDelimiter(line: string, from: number, mark: string): boolean {
  let at = from
  while (at < line.length && line[at] !== mark && BLANK.test(line[at]!)) at++
  return at >= line.length || line[at] === mark
}

function fieldEnd(line: string, start: number, mark: string, blank: boolean): number {
  if (line[start] === "(") {
    const bracketed = BRACKETED.exec(line.slice(start, start + 200))?.[0]
    if (bracketed && COMPLEX_IN_BRACKETS.test(bracketed)) {
      const end = start + bracketed.length
      if (blank ? end >= line.length || BLANK.test(line[end]!) : atDelimiter(line, end, mark)) return end
    }
  }
  if (!blank) {
    const end = line.indexOf(mark, start)
    return end < 0 ? line.length : end
  }
  let at = start
  while (at < line.length && !BLANK.test(line[at]!)) at++
  return at
}
