import { afterAll, beforeAll, describe, expect, test } from "vitest"
import { createDb, type Db } from "@/lib/server/db/client"
import { createPool } from "@/lib/server/db/create-pool"
import { signedIn } from "@tests/support/callers"
import { insertPerson } from "@tests/support/one-of-everything"
import { type Answered, send } from "@tests/support/send"
import { startApp } from "@tests/support/start-app"

let app: Awaited<ReturnType<typeof startApp>>
let db: Db
let headers: Record<string, string>
let call: (
  method: string,
  address: string,
  options?: { body?: unknown; headers?: Record<string, string> },
) => Promise<Answered>

beforeAll(async () => {
  app = await startApp()
  db = createDb(createPool(app.database.appUrl, 2))
  ;({ headers } = await signedIn(db, await insertPerson(db, "Ilse Brandvold"), app.authSecret))
  call = (method, address, options) =>
    send(app.url, method, `/api/v1${address}`, { ...options, headers: { ...headers, ...options?.headers } })
})
afterAll(async () => {
  await db.destroy()
  await app.stop()
})

async function created(title: string): Promise<string> {
  return String((await call("POST", "/manuscripts", { body: { title } })).body.id)
}

describe("a manuscript", () => {
  test("starts with its corresponding author and Draft 1", async () => {
    const made = await call("POST", "/manuscripts", { body: { title: "Slow decay" } })
    expect(made.status).toBe(201)
    expect(made.headers.get("location")).toBe(`/api/v1/manuscripts/${String(made.body.id)}`)
    const { items } = (await call("GET", "/manuscripts")).body as { items: unknown[] }
    expect(items[0]).toMatchObject({
      title: "Slow decay",
      role: "corresponding-author",
      people: 1,
      figures: 0,
      draft: { number: 1, state: "open" },
    })
  })

  test("is changed only from the revision that was seen", async () => {
    const address = `/manuscripts/${await created("Before")}`
    const change = (tag?: string) =>
      call("PATCH", address, {
        body: { title: "After" },
        headers: tag === undefined ? {} : { "if-match": tag },
      })
    expect((await change()).code).toBe("revision-required")
    const seen = (await call("GET", address)).headers.get("etag") ?? ""
    const changed = await change(seen)
    expect([changed.status, changed.body.title]).toEqual([200, "After"])
    expect((await change(seen)).code).toBe("stale-revision")
    expect((await change("*")).code).toBe("stale-revision")
    expect((await change(changed.headers.get("etag") ?? "")).status).toBe(200)
  })
})

describe("an idempotency key", () => {
  const create = (key: string, title: string) =>
    call("POST", "/manuscripts", { body: { title }, headers: { "idempotency-key": key } })
  const titled = async (title: string) =>
    ((await call("GET", "/manuscripts")).body.items as { title: string }[]).filter(
      (each) => each.title === title,
    )

  test("makes a repeated request answer the same and create once", async () => {
    const [first, again] = [await create("key-1", "Once"), await create("key-1", "Once")]
    expect(again.body).toEqual(first.body)
    expect(again.headers.get("idempotent-replay")).toBe("true")
    expect(again.headers.get("location")).toBe(first.headers.get("location"))
    expect(await titled("Once")).toHaveLength(1)
  })

  test("creates once when the requests come at the same time", async () => {
    const answers = await Promise.all(Array.from({ length: 5 }, () => create("key-2", "Together")))
    expect(answers.every(({ status, code }) => status === 201 || code === "conflict")).toBe(true)
    expect(await titled("Together")).toHaveLength(1)
  })

  test("is refused with another request, and free again after a refusal", async () => {
    await create("key-3", "This")
    expect((await create("key-3", "That")).code).toBe("conflict")
    expect((await create("key-4", "")).code).toBe("invalid-request")
    expect((await create("key-4", "Corrected")).status).toBe(201)
  })
})

describe("problems", () => {
  test("list every place that is wrong, with the request's id", async () => {
    const answer = await call("POST", "/manuscripts", { body: { title: "", abstract: 3, extra: true } })
    expect(answer.status).toBe(400)
    expect((answer.body.errors as { pointer: string }[]).map((each) => each.pointer)).toEqual([
      "/title",
      "/abstract",
      "",
    ])
    expect(answer.body.requestId).toBe(answer.headers.get("x-request-id"))
  })

  test.each([
    ["not JSON", "{", "application/json", "invalid-request"],
    ["nothing", "", "application/json", "invalid-request"],
    ["another type", "title=x", "application/x-www-form-urlencoded", "unsupported-media-type"],
    ["too much", `"${"x".repeat(3_000_000)}"`, "application/json", "too-large"],
  ])("say what is wrong with %s", async (_, body, type, code) => {
    const answer = await fetch(`${app.url}/api/v1/manuscripts`, {
      method: "POST",
      body,
      headers: { ...headers, origin: app.url, "content-type": type },
    })
    expect(((await answer.json()) as { code: string }).code).toBe(code)
  })

  test("tell an unknown address from a wrong method", async () => {
    expect((await call("GET", "/nothing")).code).toBe("not-found")
    const wrong = await call("PUT", "/manuscripts")
    expect([wrong.code, wrong.headers.get("allow")]).toEqual(["method-not-allowed", "GET, POST"])
  })

  test("do not say that a manuscript exists", async () => {
    const address = `/manuscripts/${await created("Secret")}`
    const stranger = await signedIn(db, await insertPerson(db, "Stranger"), app.authSecret)
    const [theirs, none] = [
      await send(app.url, "GET", `/api/v1${address}`, stranger),
      await send(app.url, "GET", `/api/v1/manuscripts/${crypto.randomUUID()}`, stranger),
    ]
    expect({ ...theirs.body, requestId: "" }).toEqual({ ...none.body, requestId: "" })
    expect((await call("GET", "/manuscripts/not-an-id")).code).toBe("not-found")
  })
})
