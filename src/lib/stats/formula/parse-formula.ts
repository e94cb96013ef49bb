import { FormulaError } from "./formula-error"
import { formulaConstants, formulaFunctions } from "./formula-functions"
import { formulaTokens, type Token } from "./formula-tokens"

type Evaluate = (values: ReadonlyMap<string, number>) => number

/** A formula that was understood. */
export interface Formula {
  readonly text: string
  /** Names that it uses, each once, in the order of their first use. */
  readonly names: readonly string[]
  /**
   * Value for a number for each name; NaN or an infinity where the formula has none, as in arithmetic.
   */
  readonly evaluate: Evaluate
}

const longest = 500
const deepest = 60

/**
 * Reads a formula over named numbers: + - * / ^, brackets, sqrt, exp, log, abs, min, max and pi. A sign binds less than a
 * power, so -a^2 is -(a^2), and powers group from the right. Nothing is ever executed but these operations.
 *
 * @param text such as "1/alphaWeak" or "2*beta/(1 + beta)"
 * @param known names that may be used; constants and functions cannot be names
 * @throws FormulaError with the position of the first thing that is wrong
 * @example parseFormula("1/z", ["z"]).evaluate(new Map([["z", 1.5]])) // 0.666…
 */
export function parseFormula(text: string, known: Iterable<string>): Formula {
  if (text.trim() === "") throw new FormulaError("EMPTY", 0, "The formula is empty.")
  if (text.length > longest)
    throw new FormulaError("TOO_LONG", longest, `A formula may have ${longest} characters.`)
  const parser = new Parser(formulaTokens(text), new Set(known))
  const evaluate = parser.sum()
  parser.expectEnd()
  return { text, names: [...parser.used], evaluate }
}

class Parser {
  readonly used = new Set<string>()
  private at = 0
  private depth = 0

  constructor(
    private readonly tokens: readonly Token[],
    private readonly known: ReadonlySet<string>,
  ) {}

  sum(): Evaluate {
    let left = this.product()
    for (let sign = this.take("+", "-"); sign; sign = this.take("+", "-")) {
      const a = left
      const b = this.product()
      left = sign.text === "+" ? (values) => a(values) + b(values) : (values) => a(values) - b(values)
    }
    return left
  }

  expectEnd(): void {
    const token = this.tokens[this.at]!
    if (token.kind !== "end") throw this.unexpected(token, "an operator or the end")
  }

  private product(): Evaluate {
    let left = this.signed()
    for (let sign = this.take("*", "/"); sign; sign = this.take("*", "/")) {
      const a = left
      const b = this.signed()
      left = sign.text === "*" ? (values) => a(values) * b(values) : (values) => a(values) / b(values)
    }
    return left
  }

  private signed(): Evaluate {
    const sign = this.take("+", "-")
    if (!sign) return this.power()
    const operand = this.nested(sign, () => this.signed())
    return sign.text === "-" ? (values) => -operand(values) : operand
  }

  private power(): Evaluate {
    const base = this.primary()
    const sign = this.take("^")
    if (!sign) return base
    const exponent = this.nested(sign, () => this.signed())
    return (values) => base(values) ** exponent(values)
  }

  private primary(): Evaluate {
    const token = this.tokens[this.at]!
    this.at += 1
    if (token.kind === "number") {
      const value = Number(token.text)
      return () => value
    }
    if (token.kind === "name")
      return this.tokens[this.at]?.text === "(" ? this.call(token) : this.named(token)
    if (token.text !== "(") throw this.unexpected(token, "a number, a name or an opening bracket")
    const inner = this.nested(token, () => this.sum())
    this.close(token)
    return inner
  }

  private named({ text, position }: Token): Evaluate {
    const constant = formulaConstants.get(text)
    if (constant !== undefined) return () => constant
    if (formulaFunctions.has(text))
      throw new FormulaError("ARGUMENTS", position, `${text} is a function: write ${text}(…).`)
    if (!this.known.has(text))
      throw new FormulaError("UNKNOWN_NAME", position, `There is no quantity named ${text}.`)
    this.used.add(text)
    return (values) => values.get(text) ?? Number.NaN
  }

  private call({ text, position }: Token): Evaluate {
    const f = formulaFunctions.get(text)
    if (!f)
      throw new FormulaError(
        "UNKNOWN_FUNCTION",
        position,
        this.known.has(text) || formulaConstants.has(text)
          ? `${text} is not a function; write * for a product.`
          : `There is no function ${text}; there are ${[...formulaFunctions.keys()].join(", ")}.`,
      )
    const opening = this.tokens[this.at]!
    this.at += 1
    const operands: Evaluate[] = []
    do operands.push(this.nested(opening, () => this.sum()))
    while (this.take(","))
    this.close(opening)
    if (operands.length < f.fewest || operands.length > f.most)
      throw new FormulaError(
        "ARGUMENTS",
        position,
        `${text} takes ${f.fewest === f.most ? f.fewest : `${f.fewest} to ${f.most}`} values, not ${operands.length}.`,
      )
    return (values) => f.apply(operands.map((operand) => operand(values)))
  }

  /** The next token if it is one of these signs. */
  private take(...signs: readonly string[]): Token | null {
    const token = this.tokens[this.at]!
    if (token.kind !== "sign" || !signs.includes(token.text)) return null
    this.at += 1
    return token
  }

  private close(opening: Token): void {
    if (this.take(")")) return
    const token = this.tokens[this.at]!
    throw token.kind === "end"
      ? new FormulaError("UNEXPECTED", opening.position, "This bracket is not closed.")
      : this.unexpected(token, "an operator or a closing bracket")
  }

  private nested(token: Token, parse: () => Evaluate): Evaluate {
    if (this.depth >= deepest)
      throw new FormulaError("TOO_DEEP", token.position, `A formula may be nested ${deepest} levels deep.`)
    this.depth += 1
    const result = parse()
    this.depth -= 1
    return result
  }

  private unexpected(token: Token, wanted: string): FormulaError {
    const found = token.kind === "end" ? "the formula ends" : `“${token.text}” stands`
    return new FormulaError("UNEXPECTED", token.position, `Here ${found} where ${wanted} is needed.`)
  }
}
