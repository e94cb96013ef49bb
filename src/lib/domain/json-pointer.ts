/** JSON that a spec is made of. */
export type Json = null | boolean | number | string | readonly Json[] | { readonly [key: string]: Json }

/** The reference tokens of a JSON pointer: "/a~1b/0" is ["a/b", "0"]. @see RFC 6901, sections 3 and 4 */
export function pointerTokens(pointer: string): readonly string[] {
  if (pointer === "") return []
  if (!pointer.startsWith("/"))
    throw new Error(`"${pointer}" is not a JSON pointer: it has to start with "/".`)
  return pointer
    .slice(1)
    .split("/")
    .map((token) => token.replaceAll("~1", "/").replaceAll("~0", "~"))
}

/** Joins tokens into a pointer, escaping "~" and "/". @see RFC 6901, section 3 */
export function pointerOf(tokens: readonly (string | number)[]): string {
  return tokens.map((token) => `/${String(token).replaceAll("~", "~0").replaceAll("/", "~1")}`).join("")
}

/** The value at a pointer, or undefined where there is none. */
export function valueAt(document: unknown, pointer: string): unknown {
  return pointerTokens(pointer).reduce<unknown>(
    (value, token) =>
      typeof value === "object" && value !== null && Object.hasOwn(value, token)
        ? (value as Record<string, unknown>)[token]
        : undefined,
    document,
  )
}

/**
 * A copy of the document with the value at the pointer replaced, or removed when `value` is undefined. Objects on the
 * way that are missing are made; an array grows only by one at its end ("-" or its length).
 *
 * @throws Error when the way leads through a text, a number or past the end of an array.
 */
export function withValueAt<T>(document: T, pointer: string, value: unknown): T {
  const put = (node: unknown, tokens: readonly string[], path: string): unknown => {
    const [token, ...rest] = tokens
    if (token === undefined) return value
    if (Array.isArray(node)) {
      const index = token === "-" ? node.length : Number(token)
      if (!Number.isInteger(index) || index < 0 || index > node.length)
        throw new Error(`${path} has no element ${token}.`)
      const copy = node.slice()
      if (rest.length === 0 && value === undefined) copy.splice(index, 1)
      else copy[index] = put(node[index], rest, `${path}/${token}`)
      return copy
    }
    if (node !== undefined && node !== null && typeof node !== "object")
      throw new Error(`${path} is not an object, so it has no "${token}".`)
    const entries = new Map(Object.entries((node ?? {}) as object))
    if (rest.length === 0 && value === undefined) entries.delete(token)
    else entries.set(token, put(entries.get(token), rest, `${path}/${token}`))
    return Object.fromEntries(entries)
  }
  return put(document, pointerTokens(pointer), "") as T
}
