import { sql } from "kysely"
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest"
import { createDb, type Db } from "@/lib/server/db/client"
import { createPool } from "@/lib/server/db/create-pool"
import { signedIn } from "@tests/support/callers"
import { linkSecretTo } from "@tests/support/mail-link"
import { type Everything, insertOneOfEverything, insertPerson } from "@tests/support/one-of-everything"
import { type Answered, send } from "@tests/support/send"
import { startApp } from "@tests/support/start-app"

let app: Awaited<ReturnType<typeof startApp>>
let db: Db
let owner: Db
let all: Everything
type Options = { body?: unknown; headers?: Record<string, string> }
let call: (method: string, address: string, options?: Options) => Promise<Answered>
let author: Awaited<ReturnType<typeof signedIn>>
let people: string

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
beforeEach(async () => {
  await db.deleteFrom("rateLimit").execute()
  all = await insertOneOfEverything(db)
  author = await signedIn(db, all.members["corresponding-author"], app.authSecret)
  people = `/manuscripts/${all.manuscriptId}`
})

const invite = (email: string, role = "co-author") =>
  call("POST", `${people}/invitations`, { ...author, body: { email, role, message: "Join us." } })
const look = (token: string) => call("POST", "/invitations/look", { body: { token } })
const accept = (token: string, options: Options & { account?: object } = {}) =>
  call("POST", "/invitations/accept", { ...options, body: { token, account: options.account } })
const account = { name: "Rune Aalto", password: "walkers that annihilate in pairs" }

describe("invitations", () => {
  test("open an account for the invited address and make a member, once", async () => {
    const email = "rune.aalto@example.org"
    expect((await invite(email)).status).toBe(201)
    const token = await linkSecretTo(db, email)
    const offer = await look(token)
    expect(offer.body).toMatchObject({
      manuscriptTitle: "Rough fronts",
      role: "co-author",
      email,
      invitedBy: "Ilse Brandvold",
      message: "Join us.",
      hasAccount: false,
    })
    expect((await accept(token)).body.errors).toMatchObject([{ pointer: "/account" }])
    expect((await accept(token, { account: { ...account, password: "short" } })).body.errors).toMatchObject([
      { pointer: "/account/password" },
    ])
    expect((await accept(token, { account })).body).toEqual({ manuscriptId: all.manuscriptId, email })
    expect((await accept(token, { account })).code).toBe("link-used")
    expect((await look(token)).code).toBe("link-used")
    const members = (await call("GET", `${people}/members`, author)).body.items as {
      email: string
      role: string
    }[]
    expect(members.find((member) => member.email === email)?.role).toBe("co-author")
    const signIn = await call("POST", "/sign-ins", { body: { email, password: account.password } })
    expect(signIn.status).toBe(204)
  })

  test("are accepted by whoever is signed in; an address with an account has to be", async () => {
    const personId = await insertPerson(db, "Known Guest")
    const { email } = await db
      .selectFrom("person")
      .select("email")
      .where("id", "=", personId)
      .executeTakeFirstOrThrow()
    await invite(email, "reader")
    const token = await linkSecretTo(db, email)
    expect((await look(token)).body.hasAccount).toBe(true)
    expect((await accept(token, { account })).code).toBe("not-signed-in")
    const guest = await signedIn(db, personId, app.authSecret)
    expect((await call("GET", people, guest)).code).toBe("not-found")
    expect((await accept(token, guest)).status).toBe(200)
    expect((await call("GET", people, guest)).body).toMatchObject({ role: "reader" })
    expect((await invite(email)).code).toBe("conflict")
  })

  test("end when taken back, replaced, or after their time", async () => {
    const email = "somebody@example.org"
    const first = await invite(email)
    const firstToken = await linkSecretTo(db, email)
    expect((await invite(email.toUpperCase())).status).toBe(201)
    expect((await look(firstToken)).code).toBe("link-used")
    const second = await linkSecretTo(db, email.toUpperCase())
    const open = (await call("GET", `${people}/invitations`, author)).body.items as {
      id: string
      email: string
    }[]
    const mine = open.find((invitation) => invitation.email === email.toUpperCase())
    expect(open.map((invitation) => invitation.id)).not.toContain(first.body.id)
    expect((await call("DELETE", `${people}/invitations/${mine?.id ?? ""}`, author)).status).toBe(204)
    expect((await accept(second, { account })).code).toBe("link-used")
    await invite(email)
    await owner
      .updateTable("invitation")
      .set({ expiresAt: sql<Date>`now()` })
      .where("manuscriptId", "=", all.manuscriptId)
      .execute()
    expect((await accept(await linkSecretTo(db, email), { account })).code).toBe("link-used")
  })

  test("to one address are limited, and are not taken back through another manuscript", async () => {
    for (let n = 1; n <= 5; n++) expect((await invite("often@example.org")).status).toBe(201)
    expect((await invite("often@example.org")).code).toBe("too-many-requests")
    const other = await insertOneOfEverything(db)
    const foreign = `${people}/invitations/${other.invitationId}`
    expect((await call("DELETE", foreign, author)).code).toBe("not-found")
  })
})

describe("members", () => {
  test("lose access at once when removed, and get a role's rights at once when it changes", async () => {
    const reader = await signedIn(db, all.members.reader, app.authSecret)
    const member = `${people}/members/${all.members.reader}`
    const edit = () =>
      call("PATCH", people, {
        headers: { ...reader.headers, "if-match": '"1"' },
        body: { title: "Smooth fronts" },
      })
    expect((await edit()).code).toBe("not-allowed")
    const changed = await call("PATCH", member, { ...author, body: { role: "corresponding-author" } })
    expect(changed.body).toMatchObject({ role: "corresponding-author", name: "Noor Haddad" })
    expect((await edit()).status).toBe(200)
    expect((await call("DELETE", member, author)).status).toBe(204)
    expect((await call("GET", people, reader)).code).toBe("not-found")
  })

  test("leave by themselves, but not the last corresponding author", async () => {
    const reader = await signedIn(db, all.members.reader, app.authSecret)
    expect((await call("DELETE", `${people}/members/me`, reader)).status).toBe(204)
    const last = await call("DELETE", `${people}/members/me`, author)
    expect([last.code, last.body.detail]).toEqual(["conflict", "A manuscript keeps a corresponding author."])
  })

  test("are written down in the history", async () => {
    await call("DELETE", `${people}/members/${all.members.reader}`, author)
    const event = await db
      .selectFrom("event")
      .select(["kind", "subject", "personId", "data"])
      .where("manuscriptId", "=", all.manuscriptId)
      .orderBy("id", "desc")
      .executeTakeFirst()
    expect(event).toEqual({
      kind: "member.removed",
      subject: all.members.reader,
      personId: all.members["corresponding-author"],
      data: { name: "Noor Haddad" },
    })
  })
})
