import { z } from "zod"
import type { Action, TokenScope } from "@/lib/domain/policy"
import type { ProblemCode } from "./problems"

/**
 * Who may call an endpoint: anyone, anyone signed in (with the token scope it takes; null: no token, only a browser's
 * sign-in), or a member of the manuscript in the path, as its parameter `manuscriptId`, whose role allows the action.
 * The endpoint wrapper in server/http enforces it; the role test walks it.
 */
export type Access =
  | { readonly who: "public" }
  | { readonly who: "signed-in"; readonly scope: TokenScope | null }
  | { readonly who: "member"; readonly action: Action }

/** An object without fields. */
export const nothing = z.object({})

/** A request body: JSON of a schema, the raw bytes as a stream, or none. */
export type BodyContract = z.ZodType | "stream" | null

/** One method of one address: the source of routing checks, validation, OpenAPI and the typed client. */
export interface Contract<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends BodyContract = BodyContract,
  Answer extends z.ZodType | string | null = z.ZodType | string | null,
  Who extends Access = Access,
> {
  readonly id: string
  readonly method: "GET" | "POST" | "PUT" | "PATCH" | "DELETE"
  /** With parameters in braces: "/api/v1/manuscripts/{manuscriptId}". */
  readonly path: string
  readonly summary: string
  readonly access: Who
  readonly params: Params
  readonly query: Query
  readonly body: Body
  readonly status: number
  /** Schema of a JSON answer, the media type of another answer, or null for an empty one. */
  readonly answer: Answer
  readonly problems: readonly ProblemCode[]
  /** Further response headers that callers may rely on, such as ETag. */
  readonly headers?: Readonly<Record<string, string>>
}

/** What a contract leaves out, it does not take: no parameters, no query, no body. */
type Written<C extends Contract> = Omit<C, "params" | "query" | "body" | "problems"> &
  Partial<Pick<C, "params" | "query" | "body" | "problems">>

/** Fills in what is left out and keeps the literal types of a contract. */
export function defineContract<
  Answer extends z.ZodType | string | null,
  const Who extends Access,
  Params extends z.ZodType = typeof nothing,
  Query extends z.ZodType = typeof nothing,
  Body extends BodyContract = null,
>(contract: Written<Contract<Params, Query, Body, Answer, Who>>): Contract<Params, Query, Body, Answer, Who> {
  const empty = { params: nothing, query: nothing, body: null, problems: [] }
  return { ...empty, ...contract } as unknown as Contract<Params, Query, Body, Answer, Who>
}
