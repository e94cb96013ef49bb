import { sql } from "kysely"
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest"
import { createDb, type Db } from "@/lib/server/db/client"
import { createPool } from "@/lib/server/db/create-pool"
import { hashPassword } from "@/lib/server/auth/password-hash"
import { signedIn, withToken } from "@tests/support/callers"
import { linkSecretTo } from "@tests/support/mail-link"
import { insertPerson } from "@tests/support/one-of-everything"
import { type Answered, send } from "@tests/support/send"
import { startApp } from "@tests/support/start-app"

const password = "a lattice that forgets slowly"
const another = "a front that roughens slowly"

let app: Awaited<ReturnType<typeof startApp>>
let db: Db
/** Under the owner's role, to turn clocks back where the application may not. */
let owner: Db
let call: (
  method: string,
  address: string,
  options?: { body?: unknown; headers?: Record<string, string> },
) => Promise<Answered>

beforeAll(async () => {
  app = await startApp()
  db = createDb(createPool(app.database.appUrl, 2))
  owner = createDb(createPool(app.database.ownerUrl, 1))
  call = (method, address, options) => send(app.url, method, `/api/v1${address}`, options)
})
afterAll(async () => {
  await Promise.all([db.destroy(), owner.destroy()])
  await app.stop()
})
/** Every test counts its attempts from nothing. */
beforeEach(() => db.deleteFrom("rateLimit").execute())

async function personWithPassword(name: string): Promise<{ id: string; email: string }> {
  const id = await insertPerson(db, name)
  const passwordHash = await hashPassword(password)
  const { email } = await db
    .updateTable("person")
    .set({ passwordHash })
    .where("id", "=", id)
    .returning("email")
    .executeTakeFirstOrThrow()
  return { id, email }
}

const cookieOf = (answer: Answered) => ({ cookie: answer.headers.getSetCookie()[0]?.split(";")[0] ?? "" })
const signIn = (email: string, word = password) =>
  call("POST", "/sign-ins", { body: { email, password: word } })

describe("registration", () => {
  test("a link proves the address, opens the account once, and then one signs in", async () => {
    const email = "maren.oduya@example.org"
    expect((await call("POST", "/accounts", { body: { email, name: "Maren Oduya" } })).status).toBe(202)
    expect((await signIn(email)).code).toBe("wrong-credentials")
    const token = await linkSecretTo(db, email)
    const confirm = (word: string) => call("POST", "/accounts/confirm", { body: { token, password: word } })
    const weak = await confirm("maren.oduya 2026")
    expect(weak.code).toBe("invalid-request")
    expect(weak.body.errors).toMatchObject([{ pointer: "/password", code: "weak_password" }])
    expect((await confirm(password)).body).toEqual({ email })
    expect((await confirm(another)).code).toBe("link-used")
    const me = await call("GET", "/me", { headers: cookieOf(await signIn("Maren.Oduya@example.org")) })
    expect(me.body).toMatchObject({ name: "Maren Oduya", email, hasPassword: true })
  })

  test("says the same for an address that has an account, and writes to its owner", async () => {
    const { email } = await personWithPassword("Known Person")
    const answer = await call("POST", "/accounts", { body: { email: email.toUpperCase(), name: "Someone" } })
    expect([answer.status, answer.body]).toEqual([202, {}])
    const mail = await db
      .selectFrom("outbox")
      .select("subject")
      .where("recipient", "=", email)
      .executeTakeFirst()
    expect(mail?.subject).toBe("You have an account already")
  })

  test("a link ends after its time", async () => {
    const email = "late@example.org"
    await call("POST", "/accounts", { body: { email, name: "Late" } })
    await owner
      .updateTable("registration")
      .set({ expiresAt: sql<Date>`now() - interval '1 second'` })
      .execute()
    const token = await linkSecretTo(db, email)
    expect((await call("POST", "/accounts/confirm", { body: { token, password } })).code).toBe("link-used")
  })
})

describe("signing in", () => {
  test("unknown address and wrong password are told in the same words", async () => {
    const { email } = await personWithPassword("Same Words")
    const [unknown, wrong] = [await signIn("nobody@example.org"), await signIn(email, "not this one, sorry")]
    expect(unknown.status).toBe(401)
    expect({ ...unknown.body, requestId: "" }).toEqual({ ...wrong.body, requestId: "" })
  })

  test("cookies stay away from scripts and other sites", async () => {
    const { email } = await personWithPassword("Cookie Person")
    const cookie = (await signIn(email)).headers.getSetCookie()[0] ?? ""
    expect(cookie).toMatch(/; HttpOnly/)
    expect(cookie).toMatch(/; SameSite=Lax/)
  })

  test("the eleventh attempt for one address from one place waits, and other people do not", async () => {
    const { email } = await personWithPassword("Guessed Person")
    for (let attempt = 1; attempt <= 10; attempt++)
      expect((await signIn(email, "a guess in the dark")).code).toBe("wrong-credentials")
    const refused = await signIn(email)
    expect(refused.code).toBe("too-many-requests")
    expect(Number(refused.headers.get("retry-after"))).toBeGreaterThan(3000)
    const other = await personWithPassword("Other Person")
    expect((await signIn(other.email)).status).toBe(204)
    await owner
      .updateTable("rateLimit")
      .set({ windowEndsAt: sql<Date>`now()` })
      .execute()
    expect((await signIn(email)).status).toBe(204)
  })

  test("a forged forwarding header does not give new attempts", async () => {
    const { email } = await personWithPassword("Forwarded Person")
    const guess = (n: number) =>
      call("POST", "/sign-ins", {
        body: { email, password: "a guess in the dark" },
        headers: { "x-forwarded-for": `192.0.2.${n}` },
      })
    for (let n = 1; n <= 10; n++) await guess(n)
    expect((await guess(11)).code).toBe("too-many-requests")
  })
})

describe("ending sign-ins", () => {
  test("signing out ends the session itself, not only the cookie", async () => {
    const { email } = await personWithPassword("Leaving Person")
    const headers = cookieOf(await signIn(email))
    const out = await call("DELETE", "/sign-ins/current", { headers })
    expect(out.headers.getSetCookie()[0]).toMatch(/=; .*Max-Age=0/)
    expect((await call("GET", "/me", { headers })).code).toBe("not-signed-in")
  })

  test("one other browser, or all of them", async () => {
    const { id } = await personWithPassword("Many Browsers")
    const [here, there, third] = await Promise.all([1, 2, 3].map(() => signedIn(db, id, app.authSecret)))
    if (!here || !there || !third) throw new Error("three sign-ins are needed")
    const list = await call("GET", "/me/sign-ins", here)
    const items = list.body.items as { id: string; current: boolean }[]
    expect(items.filter((item) => item.current).map((item) => item.id)).toEqual([here.signInId])
    expect((await call("DELETE", `/me/sign-ins/${there.signInId}`, here)).status).toBe(204)
    expect((await call("GET", "/me", there)).code).toBe("not-signed-in")
    expect((await call("DELETE", "/me/sign-ins", here)).status).toBe(204)
    for (const browser of [here, third])
      expect((await call("GET", "/me", browser)).code).toBe("not-signed-in")
  })

  test("nobody ends another's", async () => {
    const [mine, theirs] = [await personWithPassword("One"), await personWithPassword("Two")]
    const [me, other] = [
      await signedIn(db, mine.id, app.authSecret),
      await signedIn(db, theirs.id, app.authSecret),
    ]
    expect((await call("DELETE", `/me/sign-ins/${other.signInId}`, me)).code).toBe("not-found")
    expect((await call("GET", "/me", other)).status).toBe(200)
  })
})

describe("password", () => {
  test("a reset link works once, ends all sign-ins and makes older links useless", async () => {
    const { id, email } = await personWithPassword("Forgetful Person")
    const browser = await signedIn(db, id, app.authSecret)
    await call("POST", "/password-resets", { body: { email } })
    const older = await linkSecretTo(db, email)
    await call("POST", "/password-resets", { body: { email } })
    const newer = await linkSecretTo(db, email)
    const use = (token: string, word: string) =>
      call("POST", "/password-resets/use", { body: { token, password: word } })
    expect((await use(newer, "passwordpassword")).code).toBe("invalid-request")
    expect((await use(newer, another)).status).toBe(204)
    expect((await use(newer, another)).code).toBe("link-used")
    expect((await use(older, another)).code).toBe("link-used")
    expect((await call("GET", "/me", browser)).code).toBe("not-signed-in")
    expect((await signIn(email)).code).toBe("wrong-credentials")
    expect((await signIn(email, another)).status).toBe(204)
  })

  test("a reset link ends after an hour; an unknown address gets the same answer and no mail", async () => {
    const { email } = await personWithPassword("Slow Person")
    await call("POST", "/password-resets", { body: { email } })
    await owner
      .updateTable("passwordReset")
      .set({ expiresAt: sql<Date>`now() - interval '1 second'` })
      .execute()
    const token = await linkSecretTo(db, email)
    expect((await call("POST", "/password-resets/use", { body: { token, password: another } })).code).toBe(
      "link-used",
    )
    const unknown = await call("POST", "/password-resets", { body: { email: "unknown@example.org" } })
    expect([unknown.status, unknown.body]).toEqual([202, {}])
    expect(
      await db.selectFrom("outbox").select("id").where("recipient", "=", "unknown@example.org").execute(),
    ).toEqual([])
  })

  test("resets for one address are limited", async () => {
    const { email } = await personWithPassword("Bothered Person")
    const ask = () => call("POST", "/password-resets", { body: { email } })
    for (let n = 1; n <= 5; n++) expect((await ask()).status).toBe(202)
    expect((await ask()).code).toBe("too-many-requests")
  })

  test("changing it asks for the present one and ends the other sign-ins", async () => {
    const { id } = await personWithPassword("Careful Person")
    const [here, there] = [await signedIn(db, id, app.authSecret), await signedIn(db, id, app.authSecret)]
    const change = (current: string | null) =>
      call("PUT", "/me/password", { ...here, body: { current, next: another } })
    expect((await change("something else entirely")).code).toBe("wrong-credentials")
    expect((await change(null)).code).toBe("wrong-credentials")
    expect((await change(password)).status).toBe(204)
    expect((await call("GET", "/me", here)).status).toBe(200)
    expect((await call("GET", "/me", there)).code).toBe("not-signed-in")
  })

  test("links are kept as hashes only", async () => {
    const { email } = await personWithPassword("Hashed Person")
    await call("POST", "/password-resets", { body: { email } })
    const token = await linkSecretTo(db, email)
    const { rows } =
      await sql`select from password_reset where encode(hash, 'escape') like ${`%${token}%`}`.execute(owner)
    expect(rows).toEqual([])
  })
})

describe("tokens", () => {
  test("work until revoked or expired, show their secret once, and are kept as hashes", async () => {
    const { id } = await personWithPassword("Cluster Person")
    const browser = await signedIn(db, id, app.authSecret)
    const made = await call("POST", "/me/tokens", {
      ...browser,
      body: { name: "cluster", scope: "read", days: 1 },
    })
    const secret = String(made.body.secret)
    expect(secret).toMatch(/^aq_[\w-]{43}$/)
    expect(secret.startsWith(String(made.body.prefix))).toBe(true)
    const headers = { authorization: `Bearer ${secret}` }
    expect((await call("GET", "/me", { headers })).body).toMatchObject({ id })
    const list = await call("GET", "/me/tokens", browser)
    expect(JSON.stringify(list.body)).not.toContain(secret)
    expect(list.body.items).toMatchObject([{ name: "cluster", scope: "read" }])
    expect((await call("DELETE", `/me/tokens/${String(made.body.id)}`, browser)).status).toBe(204)
    expect((await call("GET", "/me", { headers })).code).toBe("not-signed-in")

    const expired = await withToken(db, id, "all")
    await owner
      .updateTable("apiToken")
      .set({ expiresAt: sql<Date>`now()` })
      .where("id", "=", expired.tokenId)
      .execute()
    expect((await call("GET", "/me", expired)).code).toBe("not-signed-in")
  })

  test("make no further tokens and never stand in for a broken one by the cookie", async () => {
    const { id } = await personWithPassword("Token Person")
    const token = await withToken(db, id, "all")
    const body = { name: "child", scope: "all" }
    expect((await call("POST", "/me/tokens", { ...token, body })).code).toBe("scope-too-narrow")
    const browser = await signedIn(db, id, app.authSecret)
    const both = { ...browser.headers, authorization: "Bearer aq_unknown" }
    expect((await call("GET", "/me", { headers: both })).code).toBe("not-signed-in")
  })
})

describe("requests from other sites", () => {
  test("change nothing with the cookie, whatever they say or leave out", async () => {
    const { id } = await personWithPassword("Visited Person")
    const { headers } = await signedIn(db, id, app.authSecret)
    const post = (more: Record<string, string>) =>
      fetch(`${app.url}/api/v1/manuscripts`, {
        method: "POST",
        headers: { ...headers, "content-type": "application/json", ...more },
        body: JSON.stringify({ title: "Forged" }),
      })
    for (const more of [
      { origin: "https://evil.example" },
      { origin: "null" },
      { "sec-fetch-site": "cross-site" },
      { "sec-fetch-site": "same-site" },
      {},
    ] as Record<string, string>[]) {
      const answer = await post(more)
      expect([answer.status, ((await answer.json()) as { code: string }).code]).toEqual([403, "bad-origin"])
    }
    expect((await post({ "sec-fetch-site": "same-origin" })).status).toBe(201)
    expect((await post({ origin: app.url })).status).toBe(201)
  })

  test("do not sign anyone in", async () => {
    const { email } = await personWithPassword("Lured Person")
    const answer = await call("POST", "/sign-ins", {
      body: { email, password },
      headers: { origin: "https://evil.example" },
    })
    expect(answer.code).toBe("bad-origin")
  })
})

describe("odd addresses and pages", () => {
  test.each([
    "//api/v1/me",
    "/api//v1/me",
    "/%2fapi/v1/me",
    "/api/v1/manuscripts/%2e%2e%2fme",
    "/api%5cv1/me",
  ])("%s is refused", async (address) => expect((await fetch(app.url + address)).status).toBe(404))
  test("a path that is no UTF-8 is refused and ends nothing", async () => {
    expect((await fetch(`${app.url}/%E0%A4%A`)).status).toBeLessThan(500)
    expect((await fetch(`${app.url}/sign-in`, { redirect: "manual" })).status).not.toBe(500)
  })
  test("a page sends strangers to the sign-in page and remembers where they wanted to go", async () => {
    const answer = await fetch(`${app.url}/manuscripts/1?a=b`, { redirect: "manual" })
    expect([answer.status, answer.headers.get("location")]).toEqual([
      302,
      "/sign-in?next=%2Fmanuscripts%2F1%3Fa%3Db",
    ])
  })
  test("Auth.js's own session, password and sign-out addresses are shut", async () => {
    for (const address of ["session", "csrf", "providers", "signout", "callback/password", "signin/password"])
      for (const method of ["GET", "POST"])
        expect((await send(app.url, method, `/api/auth/${address}`)).status).toBe(404)
  })
})
