/** What a header can hold: no names, no calls, nothing that could run. */
export type PythonLiteral = string | number | boolean | null | PythonLiteral[] | Map<string, PythonLiteral>

const DEEPEST = 8

/**
 * Reads a Python literal of dict, tuple, list, str, int, bool and None; null when the text is anything else. Dicts become
 * Maps, because keys come from the file.
 */
export function pythonLiteral(text: string): { readonly value: PythonLiteral } | null {
  const reader = new LiteralReader(text)
  try {
    const value = reader.value(0)
    return reader.atEnd ? { value } : null
  } catch (error) {
    if (error instanceof NotALiteral) return null
    throw error
  }
}

class NotALiteral extends Error {}

class LiteralReader {
  #at = 0
  constructor(readonly text: string) {}

  get atEnd(): boolean {
    this.#skipBlanks()
    return this.#at === this.text.length
  }

  value(depth: number): PythonLiteral {
    if (depth > DEEPEST) throw new NotALiteral()
    this.#skipBlanks()
    const next = this.text[this.#at]
    if (next === "'" || next === '"') return this.#string(next)
    if (next === "(") return this.#list(")", depth)
    if (next === "[") return this.#list("]", depth)
    if (next === "{") return this.#dict(depth)
    const word = /^(?:True|False|None|-?\d+L?)/.exec(this.text.slice(this.#at, this.#at + 24))?.[0]
    if (word === undefined) throw new NotALiteral()
    this.#at += word.length
    if (word === "None") return null
    return word === "True" || word === "False" ? word === "True" : Number(word.replace("L", ""))
  }

  #skipBlanks(): void {
    while (this.#at < this.text.length && /\s/.test(this.text[this.#at]!)) this.#at++
  }

  #take(mark: string): boolean {
    this.#skipBlanks()
    if (this.text[this.#at] !== mark) return false
    this.#at++
    return true
  }

  #string(quote: string): string {
    let text = ""
    for (this.#at++; this.text[this.#at] !== quote; this.#at++) {
      if (this.#at >= this.text.length) throw new NotALiteral()
      if (this.text[this.#at] === "\\") this.#at++
      text += this.text[this.#at] ?? ""
    }
    this.#at++
    return text
  }

  #list(end: string, depth: number): PythonLiteral[] {
    this.#at++
    const items: PythonLiteral[] = []
    while (!this.#take(end)) {
      items.push(this.value(depth + 1))
      if (!this.#take(",") && this.text[this.#at] !== end) throw new NotALiteral()
    }
    return items
  }

  #dict(depth: number): Map<string, PythonLiteral> {
    this.#at++
    const items = new Map<string, PythonLiteral>()
    while (!this.#take("}")) {
      const key = this.value(depth + 1)
      if (typeof key !== "string" || !this.#take(":")) throw new NotALiteral()
      items.set(key, this.value(depth + 1))
      if (!this.#take(",") && this.text[this.#at] !== "}") throw new NotALiteral()
    }
    return items
  }
}
