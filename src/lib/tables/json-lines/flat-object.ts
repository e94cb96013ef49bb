/** A value of a flat JSON object: text as written for numbers, so that the one grammar for numbers reads it. */
export type JsonCell =
  | { readonly kind: "number"; readonly text: string }
  | { readonly kind: "text"; readonly text: string }
  | { readonly kind: "boolean"; readonly value: 0 | 1 }
  | { readonly kind: "missing" }

// The bare words NaN and Infinity are not JSON, and Python writes them.
const SCALAR = /(-?(?:\d+(?:\.\d+)?(?:[eE][+-]?\d+)?|Infinity)|NaN)|(true|false)|(null)/y
const STRING = /"(?:[^"\\\u0000-\u001f]|\\.)*"/y
const BLANKS = /[ \t\r\n]*/y

/**
 * Reads an object whose values are numbers, texts, true, false or null; null when the line is anything else, nested
 * values included. Keys come from the file, so they fill a Map.
 *
 * @see RFC 8259
 */
export function flatObject(line: string): Map<string, JsonCell> | null {
  let at = 0
  const match = (pattern: RegExp): RegExpExecArray | null => {
    pattern.lastIndex = at
    const found = pattern.exec(line)
    if (found) at = pattern.lastIndex
    return found
  }
  const take = (mark: string): boolean => {
    match(BLANKS)
    if (line[at] !== mark) return false
    at++
    match(BLANKS)
    return true
  }
  const cells = new Map<string, JsonCell>()
  if (!take("{")) return null
  if (!take("}"))
    for (;;) {
      const key = stringOf(match(STRING))
      if (key === null || !take(":")) return null
      const cell = scalarOf(match(SCALAR)) ?? textOf(stringOf(match(STRING)))
      if (!cell || cells.has(key)) return null
      cells.set(key, cell)
      if (take("}")) break
      if (!take(",")) return null
    }
  return at === line.length ? cells : null
}

function stringOf(match: RegExpExecArray | null): string | null {
  if (!match) return null
  try {
    return JSON.parse(match[0]) as string
  } catch (error) {
    if (error instanceof SyntaxError) return null
    throw error
  }
}

const textOf = (text: string | null): JsonCell | null => (text === null ? null : { kind: "text", text })

function scalarOf(match: RegExpExecArray | null): JsonCell | null {
  if (!match) return null
  if (match[1] !== undefined) return { kind: "number", text: match[1] }
  return match[2] === undefined
    ? { kind: "missing" }
    : { kind: "boolean", value: match[2] === "true" ? 1 : 0 }
}
