import type { APIContext, APIRoute } from "astro"
import { z } from "zod"
import type { Access, BodyContract, Contract } from "@/lib/contracts/contract"
import { Problem } from "@/lib/contracts/problems"
import type { Actor } from "@/lib/server/auth/actor"
import { findTokenActor } from "@/lib/server/auth/find-token-actor"
import { type Db, getDb } from "@/lib/server/db/client"
import type { Membership } from "@/lib/server/db/memberships"
import { authorise } from "./authorise"
import { onceByKey } from "./idempotency"
import { revisionTag } from "./if-match"
import { problemResponse } from "./problem-response"
import { parseJson, placesOf, queryOf, readJsonText } from "./read-request"
import { Reply } from "./reply"

type BodyOf<Body extends BodyContract> = Body extends z.ZodType
  ? z.output<Body>
  : Body extends "stream"
    ? ReadableStream<Uint8Array> | null
    : undefined

/** What a handler is given; everything in it has been checked against the contract. */
export interface Call<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends BodyContract = BodyContract,
  Who extends Access = Access,
> {
  readonly db: Db
  readonly actor: Who extends { who: "public" } ? Actor | null : Actor
  readonly membership: Who extends { who: "member" } ? Membership : null
  readonly params: z.output<Params>
  readonly query: z.output<Query>
  readonly body: BodyOf<Body>
  readonly request: Request
  readonly requestId: string
  /** Address of the client, behind trusted proxies only; for rate limits. */
  readonly clientAddress: string
}

/** Data of the contract's schema, or a whole Response where the answer is not JSON. */
type Handled<Answer extends z.ZodType | string | null> = Answer extends z.ZodType
  ? z.input<Answer> | Reply<z.input<Answer>> | Response
  : Answer extends string
    ? Response
    : void | Reply<undefined> | Response

/**
 * Makes a route of a contract: finds who asks, refuses whom the contract does not let through, checks path, query and
 * body, calls the handler and sends its answer, or the problem document of whatever was thrown.
 *
 * @example
 * export const GET = endpoint(getManuscript, ({ db, params }) => readManuscript(db, params.manuscriptId))
 */
export function endpoint<
  Params extends z.ZodType,
  Query extends z.ZodType,
  Body extends BodyContract,
  Answer extends z.ZodType | string | null,
  Who extends Access,
>(
  contract: Contract<Params, Query, Body, Answer, Who>,
  handler: (call: Call<Params, Query, Body, Who>) => Promise<Handled<Answer>> | Handled<Answer>,
): APIRoute {
  return async (context) => {
    const { request, locals } = context
    try {
      const db = getDb()
      const actor = await actorOf(db, context)
      const membership = await authorise(db, contract, actor, context.params)
      const params = contract.params.safeParse(context.params)
      if (!params.success) throw new Problem("not-found")
      const { query, body, text } = await readInput(contract, request, context.url)
      const answer = async () => {
        const call = { db, actor, membership, params: params.data, query, body, request } as unknown
        return send(
          contract,
          await handler({
            ...(call as Call<Params, Query, Body, Who>),
            requestId: locals.requestId,
            clientAddress: locals.clientAddress,
          }),
        )
      }
      if (contract.method !== "POST" || actor === null || contract.body === "stream") return await answer()
      return await onceByKey(db, actor.person.id, request, text, answer)
    } catch (error) {
      return problemResponse(error, locals.requestId)
    }
  }
}

/** A token that is sent decides alone; the browser's sign-in was found by the middleware. */
async function actorOf(db: Db, { request, locals }: APIContext): Promise<Actor | null> {
  const tokenActor = await findTokenActor(db, request.headers.get("authorization"))
  if (tokenActor === null)
    throw new Problem("not-signed-in", "The token is not known, has expired or was revoked.")
  return tokenActor ?? locals.actor ?? null
}

/** Query and body together, so that one answer lists everything that is wrong with either. */
async function readInput(contract: Contract, request: Request, url: URL) {
  const query = contract.query.safeParse(queryOf(url))
  const places = query.success ? [] : [...placesOf(query.error.issues, "query")]
  let text = ""
  let body: unknown = contract.body === "stream" ? request.body : undefined
  if (contract.body instanceof z.ZodType) {
    text = await readJsonText(request)
    const parsed = contract.body.safeParse(parseJson(text))
    if (parsed.success) body = parsed.data
    else places.push(...placesOf(parsed.error.issues, "body"))
  }
  if (places.length > 0) throw new Problem("invalid-request", undefined, places)
  return { query: query.data, body, text }
}

/** The Response of what a handler returned; data that breaks the contract is our error, not the caller's. */
function send(contract: Contract, handled: unknown): Response {
  if (handled instanceof Response) return handled
  const { data, options } = handled instanceof Reply ? handled : new Reply(handled, {})
  const headers = new Headers({ "cache-control": "no-store", ...options.headers })
  if (options.revision !== undefined) headers.set("etag", revisionTag(options.revision))
  const status = options.status ?? contract.status
  if (!(contract.answer instanceof z.ZodType)) return new Response(null, { status, headers })
  headers.set("content-type", "application/json")
  return new Response(JSON.stringify(contract.answer.parse(data)), { status, headers })
}
