import type { z } from "zod"
import type { BodyContract, Contract } from "@/lib/contracts/contract"
import { Problem, type ProblemDocument } from "@/lib/contracts/problems"

type Input<Schema> = Schema extends z.ZodType ? z.input<Schema> : never
type BodyInput<Body> = Body extends z.ZodType ? z.input<Body> : Body extends "stream" ? BodyInit : undefined
type AnswerOf<Answer> = Answer extends z.ZodType
  ? z.output<Answer>
  : Answer extends string
    ? Response
    : undefined

export interface CallOptions<C extends Contract> {
  readonly params?: Input<C["params"]>
  readonly query?: Input<C["query"]>
  readonly body?: BodyInput<C["body"]>
  readonly headers?: Readonly<Record<string, string>>
  readonly signal?: AbortSignal
}

export interface Answered<C extends Contract> {
  readonly data: AnswerOf<C["answer"]>
  /** Revision for If-Match, where the endpoint has one. */
  readonly etag: string | null
}

/** The address of a contract with its parameters and query filled in. */
export function addressOf(contract: Contract, params: object = {}, query: object = {}): string {
  const path = contract.path.replace(/\{(\w+)\}/g, (_, name: string) => {
    const value = (params as Record<string, unknown>)[name]
    if (value === undefined) throw new Error(`${contract.id} needs the parameter ${name}.`)
    return encodeURIComponent(String(value))
  })
  const search = new URLSearchParams(
    Object.entries(query)
      .filter(([, value]) => value !== undefined)
      .map(([name, value]) => [name, String(value)]),
  ).toString()
  return search ? `${path}?${search}` : path
}

/**
 * Calls an endpoint by its contract.
 *
 * @throws Problem with the server's code, detail and places; `unavailable` when no answer came.
 */
export async function call<C extends Contract<z.ZodType, z.ZodType, BodyContract, z.ZodType | string | null>>(
  contract: C,
  { params, query, body, headers, signal }: CallOptions<C> = {},
): Promise<Answered<C>> {
  const isJson = body !== undefined && contract.body !== "stream"
  let response: Response
  try {
    response = await fetch(addressOf(contract, params as object, query as object), {
      method: contract.method,
      headers: {
        accept: "application/json",
        ...(isJson ? { "content-type": "application/json" } : {}),
        ...headers,
      },
      body: body === undefined ? null : isJson ? JSON.stringify(body) : (body as BodyInit),
      signal: signal ?? null,
    })
  } catch (error) {
    if (signal?.aborted) throw error
    throw new Problem("unavailable", "No answer came from the server; your change was not sent.")
  }
  if (!response.ok) throw await problemOf(response)
  const etag = response.headers.get("etag")
  if (contract.answer === null) return { data: undefined as AnswerOf<C["answer"]>, etag }
  if (typeof contract.answer === "string") return { data: response as AnswerOf<C["answer"]>, etag }
  return { data: contract.answer.parse(await response.json()) as AnswerOf<C["answer"]>, etag }
}

/** Reads a problem document; an answer without one becomes an `internal` problem that names its status. */
export async function problemOf(response: Response): Promise<Problem> {
  if (!response.headers.get("content-type")?.includes("problem+json"))
    return new Problem("internal", `The server answered ${response.status} without saying why.`)
  const document = (await response.json()) as ProblemDocument
  return new Problem(document.code, document.detail, document.errors ?? [])
}

/** One sentence for a person: what happened and what to do. */
export function sentenceOf(error: unknown): string {
  if (error instanceof Problem) {
    const places = error.errors.map((issue) => issue.message).join(" ")
    return places ? `${error.detail} ${places}` : error.detail
  }
  return error instanceof Error ? error.message : String(error)
}
