import { randomUUID } from "node:crypto"
import type { MiddlewareHandler } from "astro"
import { getSession } from "@/lib/server/auth/auth-astro.js"
import { contracts } from "@/lib/contracts"
import { Problem } from "@/lib/contracts/problems"
import type { Actor } from "@/lib/server/auth/actor"
import { authOptions } from "@/lib/server/auth/auth-options"
import { forgetCookie, sessionCookiesOf } from "@/lib/server/auth/session-cookie"
import { findSignInActor } from "@/lib/server/auth/sign-in-rows"
import { getDb } from "@/lib/server/db/client"
import { env } from "@/lib/server/env"
import { unroutedProblem } from "@/lib/server/http/contracts-at"
import { isOddPath } from "@/lib/server/http/odd-path"
import { refuseOtherOrigins } from "@/lib/server/http/origin"
import { problemResponse } from "@/lib/server/http/problem-response"

/** Pages that people reach without having signed in; every other page asks for it. */
const openPages = /^\/(sign-in|register|confirm|password-reset|invitation|api-docs|problems|mail)(\/|$)/

/**
 * Runs before every page and endpoint: refuses odd paths and other sites, finds who is signed in, sends people who are
 * not to the sign-in page. Endpoints decide for themselves whom they let through; this is not their guard.
 */
export const onRequest: MiddlewareHandler = async ({ request, locals, url, ...context }, next) => {
  locals.requestId = randomUUID()
  locals.actor = null
  const isApi = url.pathname.startsWith("/api/")
  const spent: string[] = []
  let response: Response
  try {
    locals.clientAddress ??= context.clientAddress
    if (isOddPath(request.url)) throw new Problem("not-found")
    refuseOtherOrigins(request, new URL(env().PUBLIC_URL).origin)
    const cookies = sessionCookiesOf(request)
    if (cookies.length > 0) locals.actor = await signedInActor(request)
    if (locals.actor === null) spent.push(...cookies)
    if (!isApi && locals.actor === null && !openPages.test(url.pathname))
      response = context.redirect(`/sign-in?next=${encodeURIComponent(url.pathname + url.search)}`)
    else response = await next()
    const isProblem = response.headers.get("content-type") === "application/problem+json"
    if (isApi && response.status === 404 && !isProblem)
      throw unroutedProblem(contracts, request.method, url.pathname)
  } catch (error) {
    response = problemResponse(error, locals.requestId)
  }
  // A copy, because redirects come with headers that cannot be changed.
  const answer = new Response(response.body, response)
  answer.headers.set("x-request-id", locals.requestId)
  // React and the chart set style attributes; style elements still need their hash.
  const policy = answer.headers.get("content-security-policy")
  if (policy?.includes("script-src"))
    answer.headers.set("content-security-policy", `${policy} style-src-attr 'unsafe-inline';`)
  const renewed = answer.headers.getSetCookie().map((cookie) => cookie.split("=")[0])
  for (const name of spent)
    if (!renewed.includes(name)) answer.headers.append("set-cookie", forgetCookie(name))
  return answer
}

/** The session is asked for here and nowhere else; its row says whether it still holds. */
async function signedInActor({ headers }: Request): Promise<Actor | null> {
  const session = await getSession(new Request(env().PUBLIC_URL, { headers }), authOptions())
  return session?.signInId === undefined ? null : findSignInActor(getDb(), session.signInId)
}
