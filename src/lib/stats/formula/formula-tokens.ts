import { FormulaError } from "./formula-error"

export interface Token {
  readonly kind: "number" | "name" | "sign" | "end"
  readonly text: string
  readonly position: number
}

/** A typographic sign and what it stands for. */
const signs: Readonly<Record<string, string>> = { "−": "-", "×": "*", "·": "*" }
const number = /^(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?/
const name = /^[A-Za-z][A-Za-z0-9_]*/

/**
 * Splits a formula into numbers, names and signs, closed by an `end`.
 *
 * @throws FormulaError UNEXPECTED, BAD_NUMBER
 */
export function formulaTokens(text: string): Token[] {
  const tokens: Token[] = []
  let position = 0
  while (position < text.length) {
    const rest = text.slice(position)
    const space = /^\s+/.exec(rest)
    if (space) {
      position += space[0].length
      continue
    }
    const found = number.exec(rest)
    const word = found ? null : name.exec(rest)
    if (found) {
      if (!Number.isFinite(Number(found[0])))
        throw new FormulaError("BAD_NUMBER", position, `The number ${found[0]} is too large.`)
      // "2x" or "1.2.3": what follows a number has to be a sign.
      const next = text.charAt(position + found[0].length)
      if (/[A-Za-z0-9_.]/.test(next))
        throw new FormulaError(
          "UNEXPECTED",
          position + found[0].length,
          `“${next}” follows the number ${found[0]} at once; write * for a product.`,
        )
      tokens.push({ kind: "number", text: found[0], position })
    } else if (word) tokens.push({ kind: "name", text: word[0], position })
    else {
      const sign = String.fromCodePoint(rest.codePointAt(0)!)
      const plain = signs[sign] ?? sign
      if (!"+-*/^(),".includes(plain))
        throw new FormulaError("UNEXPECTED", position, `“${sign}” has no meaning in a formula.`)
      tokens.push({ kind: "sign", text: plain, position })
    }
    position += tokens.at(-1)!.kind === "sign" ? 1 : tokens.at(-1)!.text.length
  }
  tokens.push({ kind: "end", text: "", position: text.length })
  return tokens
}
