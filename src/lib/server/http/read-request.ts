import type { z } from "zod"
import { Problem, type ProblemIssue } from "@/lib/contracts/problems"
import { pointerOf } from "@/lib/domain/json-pointer"

/** JSON bodies hold specs and texts; tables come as streams. */
export const maxJsonBytes = 2 * 1024 * 1024

type Issues = readonly z.core.$ZodIssue[]

/** Zod's issues as places: a JSON pointer into the body, or "?name" for a parameter of the query. */
export function placesOf(issues: Issues, where: "body" | "query"): readonly ProblemIssue[] {
  return issues.map((issue) => {
    const tokens = issue.path.map((token) => (typeof token === "symbol" ? String(token) : token))
    const pointer = where === "body" ? pointerOf(tokens) : `?${tokens.join(".")}`
    return { pointer, code: issue.code ?? "custom", message: issue.message }
  })
}

/** Query parameters by name; one that is repeated becomes an array. */
export function queryOf(url: URL): Record<string, string | string[]> {
  const names = new Set(url.searchParams.keys())
  return Object.fromEntries(
    [...names].map((name) => {
      const values = url.searchParams.getAll(name)
      return [name, values.length === 1 ? (values[0] ?? "") : values]
    }),
  )
}

/**
 * The text of a JSON body.
 *
 * @throws Problem `unsupported-media-type`, or `too-large` as soon as the limit is passed
 */
export async function readJsonText(request: Request): Promise<string> {
  const type = request.headers.get("content-type")?.split(";")[0]?.trim().toLowerCase()
  if (request.body === null) return ""
  if (type !== "application/json")
    throw new Problem("unsupported-media-type", "Send the body as application/json.")
  // The rest of a body that is not read would be taken for the next request: the connection ends with the answer.
  const tooLarge = new Problem("too-large", `A JSON body may have ${maxJsonBytes} bytes at most.`, [], {
    connection: "close",
  })
  if (Number(request.headers.get("content-length") ?? 0) > maxJsonBytes) throw tooLarge
  const chunks: Uint8Array[] = []
  let size = 0
  for await (const chunk of request.body as unknown as AsyncIterable<Uint8Array>) {
    size += chunk.byteLength
    if (size > maxJsonBytes) throw tooLarge
    chunks.push(chunk)
  }
  return new TextDecoder().decode(Buffer.concat(chunks))
}

/** @throws Problem `invalid-request` when the text is not JSON */
export function parseJson(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch (error) {
    const reason = text === "" ? "The body is empty." : (error as SyntaxError).message
    throw new Problem("invalid-request", "The body is not JSON.", [
      { pointer: "", code: "invalid_json", message: reason },
    ])
  }
}
