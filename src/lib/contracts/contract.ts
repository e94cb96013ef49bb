import type { z } from "zod"
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

/** Keeps the literal types of a contract. */
export function defineContract<
  Params extends z.ZodType,
  Query extends z.ZodType,
  Body extends BodyContract,
  Answer extends z.ZodType | string | null,
  const Who extends Access,
>(contract: Contract<Params, Query, Body, Answer, Who>): Contract<Params, Query, Body, Answer, Who> {
  return contract
}
