import { afterAll, beforeAll, describe, expect, test } from "vitest"
import { contracts } from "@/lib/contracts"
import type { Contract } from "@/lib/contracts/contract"
import type { ProblemDocument } from "@/lib/contracts/problems"
import { roleMay, roles, type Role, scopeMay, type TokenScope, tokenScopes } from "@/lib/domain/policy"
import { createDb, type Db } from "@/lib/server/db/client"
import { createPool } from "@/lib/server/db/create-pool"
import { signedIn, withToken } from "@tests/support/callers"
import { type Everything, insertOneOfEverything, insertPerson } from "@tests/support/one-of-everything"
import { startApp } from "@tests/support/start-app"

/** Who calls: a member in a role, a member of another manuscript, or nobody; by a browser or by a token. */
interface Caller {
  readonly name: string
  readonly who: Role | "outsider" | "nobody"
  readonly token: TokenScope | null
}

const callers: readonly Caller[] = [
  { name: "nobody", who: "nobody", token: null },
  { name: "a member of another manuscript", who: "outsider", token: null },
  ...roles.map((role) => ({ name: role, who: role, token: null })),
  ...tokenScopes.map((scope) => ({
    name: `a corresponding author's token of scope ${scope}`,
    who: "corresponding-author" as const,
    token: scope,
  })),
  { name: "a reader's token of scope all", who: "reader", token: "all" },
  { name: "an outsider's token of scope all", who: "outsider", token: "all" },
]

/** What keeps a caller out of an endpoint; null when nothing does. */
function refusal({ access }: Contract, { who, token }: Caller): string | null {
  if (access.who === "public") return null
  if (who === "nobody") return "not-signed-in"
  if (access.who === "signed-in") {
    if (token === null || access.scope === "read") return null
    const covers = access.scope === token || (access.scope !== null && token === "all")
    return covers ? null : "scope-too-narrow"
  }
  if (who === "outsider") return "not-found"
  if (!roleMay(who, access.action)) return "not-allowed"
  return token !== null && !scopeMay(token, access.action) ? "scope-too-narrow" : null
}

const refusals = [
  "not-signed-in",
  "not-allowed",
  "scope-too-narrow",
  "not-found",
  "method-not-allowed",
  "internal",
]

/** Values of path parameters; a new parameter of a contract is added here. */
function parametersOf(all: Everything, own: { signInId: string; tokenId: string }): Record<string, string> {
  return {
    manuscriptId: all.manuscriptId,
    personId: all.members.reader,
    invitationId: all.invitationId,
    signInId: own.signInId,
    tokenId: own.tokenId,
    datasetName: "annihilation",
    figureId: all.figureId,
    format: "svg",
    threadId: all.threadId,
    draftNumber: "1",
    number: "1",
  }
}

function fill(path: string, parameters: Record<string, string>): string {
  return path.replace(/\{(\w+)\}/g, (_, name: string) => {
    const value = parameters[name]
    if (value === undefined) throw new Error(`Say in parametersOf what {${name}} of ${path} is.`)
    return value
  })
}

let app: Awaited<ReturnType<typeof startApp>>
let db: Db

beforeAll(async () => {
  app = await startApp()
  db = createDb(createPool(app.database.appUrl, 2))
})
afterAll(async () => {
  await db.destroy()
  await app.stop()
})

/** Calls an endpoint on a manuscript of its own, so that no case sees what another one did. */
async function attempt(contract: Contract, caller: Caller) {
  const all = await insertOneOfEverything(db)
  const personId =
    caller.who === "nobody" || caller.who === "outsider"
      ? await insertPerson(db, "Outside Person")
      : all.members[caller.who]
  const browser = await signedIn(db, personId, app.authSecret)
  const token = await withToken(db, personId, caller.token ?? "all")
  const identity = caller.who === "nobody" ? {} : caller.token === null ? browser.headers : token.headers
  const body =
    contract.body === null
      ? null
      : contract.body === "stream"
        ? "t,n\n1,2\n2,1\n"
        : JSON.stringify({ "-": 0 })
  const address = fill(contract.path, parametersOf(all, { ...browser, ...token }))
  const response = await fetch(app.url + address, {
    method: contract.method,
    body,
    redirect: "manual",
    headers: {
      ...identity,
      origin: new URL(app.url).origin,
      ...(contract.body === null
        ? {}
        : { "content-type": contract.body === "stream" ? "text/csv" : "application/json" }),
    },
  })
  const isProblem = response.headers.get("content-type")?.startsWith("application/problem+json")
  if (isProblem) return ((await response.json()) as ProblemDocument).code
  await response.body?.cancel()
  return response.status < 400 ? "answered" : `status ${response.status}`
}

describe.each(contracts.map((contract) => [`${contract.method} ${contract.path}`, contract] as const))(
  "%s",
  (_, contract) => {
    test.each(callers.map((caller) => [caller.name, caller] as const))("%s", async (_name, caller) => {
      const expected = refusal(contract, caller)
      const code = await attempt(contract, caller)
      if (expected === null) expect(refusals).not.toContain(code)
      else expect(code).toBe(expected)
    })
  },
)
