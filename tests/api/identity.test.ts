import { afterAll, beforeAll, describe, expect, test } from "vitest"
import { createDb, type Db } from "@/lib/server/db/client"
import { createPool } from "@/lib/server/db/create-pool"
import { client, startIdentityProvider } from "@tests/support/identity-provider"
import { insertPerson } from "@tests/support/one-of-everything"
import { send } from "@tests/support/send"
import { startApp } from "@tests/support/start-app"

let provider: Awaited<ReturnType<typeof startIdentityProvider>>
let app: Awaited<ReturnType<typeof startApp>>
let db: Db

beforeAll(async () => {
  provider = await startIdentityProvider()
  app = await startApp({
    OIDC_ISSUER: provider.issuer,
    OIDC_CLIENT_ID: client.id,
    OIDC_CLIENT_SECRET: client.secret,
  })
  provider.serve(`${app.url}/api/auth/callback/oidc`)
  db = createDb(createPool(app.database.appUrl, 2))
})
afterAll(async () => {
  await db.destroy()
  await app.stop()
  provider.stop()
})

/** Follows the round trip as a browser: cookies kept for each host and path, redirects followed. */
async function signInThroughProvider() {
  const jar = new Map<string, string>()
  let response = await visit(`${app.url}/api/auth/signin/oidc`, jar, {
    method: "POST",
    headers: { origin: app.url, "content-type": "application/x-www-form-urlencoded" },
    body: "callbackUrl=%2Fme",
  })
  let location = response.headers.get("location")
  for (let hops = 0; location !== null && hops < 12; hops++) {
    const address = new URL(location, response.url)
    if (address.origin === new URL(app.url).origin && !address.pathname.startsWith("/api/auth/")) break
    response = await visit(address.href, jar)
    location = response.headers.get("location")
  }
  const session = [...jar].find(([name, value]) => name.endsWith("authjs.session-token") && value !== "")
  const headers: Record<string, string> =
    session === undefined ? {} : { cookie: `authjs.session-token=${session[1]}` }
  return { arrived: location, me: await send(app.url, "GET", "/api/v1/me", { headers }) }
}

async function visit(address: string, jar: Map<string, string>, init: RequestInit = {}): Promise<Response> {
  const host = new URL(address).host
  const cookie = [...jar]
    .filter(([name]) => name.startsWith(`${host} `))
    .map(([name, value]) => `${name.slice(host.length + 1)}=${value}`)
    .join("; ")
  const response = await fetch(address, { ...init, redirect: "manual", headers: { ...init.headers, cookie } })
  for (const line of response.headers.getSetCookie()) {
    const [, name = "", value = ""] = /^([^=]+)=([^;]*)/.exec(line) ?? []
    jar.set(`${host} ${name}`, value)
  }
  return response
}

describe("signing in through the identity provider", () => {
  test("opens an account for a verified address, and finds it again", async () => {
    const claims = { sub: "s-1", name: "Ingrid Voss", email: "ingrid.voss@example.org", email_verified: true }
    provider.signsIn(claims)
    const first = await signInThroughProvider()
    expect(first.me.body).toMatchObject({ name: "Ingrid Voss", email: claims.email, hasPassword: false })
    expect(first.arrived).toMatch(/\/me$/)
    provider.signsIn({ ...claims, email: "moved@example.org" })
    const again = await signInThroughProvider()
    expect(again.me.body.id).toBe(first.me.body.id)
  })

  test("joins an account with the same verified address", async () => {
    const id = await insertPerson(db, "Joined Person")
    const { email } = await db
      .selectFrom("person")
      .select("email")
      .where("id", "=", id)
      .executeTakeFirstOrThrow()
    provider.signsIn({ sub: "s-2", name: "J. Person", email: email.toUpperCase(), email_verified: true })
    expect((await signInThroughProvider()).me.body).toMatchObject({ id, name: "Joined Person" })
  })

  test.each([
    ["an unverified address", { sub: "s-3", email: "unproved@example.org", email_verified: false }],
    ["no word on verification", { sub: "s-4", email: "unproved@example.org" }],
    ["no address", { sub: "s-5" }],
  ])("refuses %s", async (_, claims) => {
    provider.signsIn(claims)
    const { arrived, me } = await signInThroughProvider()
    expect(me.code).toBe("not-signed-in")
    expect(arrived).toContain("/sign-in?error=unverified")
    expect(
      await db.selectFrom("identity").select("subject").where("subject", "=", claims.sub).execute(),
    ).toEqual([])
  })

  test("does not send people to another site afterwards", async () => {
    const jar = new Map<string, string>()
    const response = await visit(`${app.url}/api/auth/signin/oidc`, jar, {
      method: "POST",
      headers: { origin: app.url, "content-type": "application/x-www-form-urlencoded" },
      body: "callbackUrl=https%3A%2F%2Fevil.example%2F",
    })
    expect(response.status).toBe(302)
    const back = [...jar].find(([name]) => name.endsWith("callback-url"))?.[1] ?? ""
    expect(decodeURIComponent(back)).toBe(app.url)
  })
})
