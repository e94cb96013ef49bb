import { execFile } from "node:child_process"
import { promisify } from "node:util"
import { runOnce } from "graphile-worker"
import { sql } from "kysely"
import type pg from "pg"
import { afterAll, beforeAll, describe, expect, test } from "vitest"
import { createDb, type Db } from "@/lib/server/db/client"
import { createPool } from "@/lib/server/db/create-pool"
import { deleteExpiredRows } from "@/lib/server/db/delete-expired-rows"
import { insertEvent } from "@/lib/server/db/events"
import { addMail } from "@/lib/server/db/outbox"
import { migrate } from "@/lib/server/db/migrate"
import { countAttempt } from "@/lib/server/db/rate-limits"
import { freshDatabase } from "@tests/support/fresh-database"
import { insertPerson } from "@tests/support/one-of-everything"

let database: Awaited<ReturnType<typeof freshDatabase>>
let pool: pg.Pool
let app: Db
let owner: Db

beforeAll(async () => {
  database = await freshDatabase()
  pool = createPool(database.appUrl, 4)
  app = createDb(pool)
  owner = createDb(createPool(database.ownerUrl, 1))
})
afterAll(async () => {
  await Promise.all([app.destroy(), owner.destroy()])
  await database.drop()
})

describe("the schema", () => {
  test("is up to date after one migration; a second one does nothing", async () => {
    expect(await migrate(database.ownerUrl)).toEqual([])
  })

  test("gives the application rights on every table of ours", async () => {
    const { rows } = await sql<{ name: string }>`select relname as name from pg_class
      where relnamespace = 'public'::regnamespace and relkind = 'r' and relname not like 'kysely%'
        and not has_table_privilege('afterquench_app', oid, 'select')`.execute(owner)
    expect(rows).toEqual([])
  })

  test("lets the application empty no table and switch off no guard", async () => {
    const { rows } = await sql<{ name: string }>`select relname as name from pg_class
      where relkind = 'r' and (has_table_privilege('afterquench_app', oid, 'truncate')
        or has_table_privilege('afterquench_app', oid, 'trigger')
        or pg_has_role('afterquench_app', relowner, 'usage'))`.execute(owner)
    expect(rows).toEqual([])
  })

  test("says of every foreign key what happens on delete", async () => {
    const { rows } = await sql`select conrelid::regclass as child, conname from pg_constraint
      where contype = 'f' and connamespace = 'public'::regnamespace and confdeltype = 'a'`.execute(owner)
    expect(rows).toEqual([])
  })

  test("keeps moments with their time zone", async () => {
    const { rows } = await sql`select table_name, column_name from information_schema.columns
      where table_schema = 'public' and data_type = 'timestamp without time zone'`.execute(owner)
    expect(rows).toEqual([])
  })

  test("makes identifiers of version 7 that sort by creation", async () => {
    const ids: string[] = []
    for (let n = 0; n < 3; n++) {
      const { rows } = await sql<{ id: string }>`select uuid_v7() as id`.execute(app)
      ids.push(rows[0]?.id ?? "")
    }
    for (const id of ids)
      expect(id).toMatch(/^[0-9a-f]{8}-[0-9a-f]{4}-7[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/)
    const times = ids.map((id) => id.slice(0, 13))
    expect(times).toEqual(times.toSorted())
    const milliseconds = Number.parseInt((ids[0] ?? "").replaceAll("-", "").slice(0, 12), 16)
    expect(Math.abs(Date.now() - milliseconds)).toBeLessThan(60_000)
  })

  test("is what the generated types say", async () => {
    const codegen = ["--config-file", "src/lib/server/db/codegen.json", "--verify"]
    await promisify(execFile)("node_modules/.bin/kysely-codegen", codegen, {
      env: { ...process.env, DATABASE_OWNER_URL: database.ownerUrl },
    })
  })
})

describe("the application's role", () => {
  test("puts mail in the outbox with its job, and works jobs off", async () => {
    const id = await addMail(app, { recipient: "a@example.org", subject: "Subject", text: "Text" })
    const done: unknown[] = []
    const taskList = { "send-mail": (payload: unknown) => void done.push(payload) }
    await runOnce({ pgPool: pool, taskList, noHandleSignals: true })
    expect(done).toEqual([{ outboxId: id }])
  })

  test("adds no job when the transaction fails", async () => {
    await expect(
      app.transaction().execute(async (trx) => {
        await addMail(trx, { recipient: "b@example.org", subject: "Subject", text: "Text" })
        throw new Error("afterwards")
      }),
    ).rejects.toThrow("afterwards")
    const { rows } = await sql`select from graphile_worker.jobs`.execute(app)
    expect(rows).toEqual([])
  })

  test("hears of events when they are committed", async () => {
    const personId = await insertPerson(app, "Heard Person")
    const listener = await pool.connect()
    try {
      await listener.query("listen afterquench_event")
      const heard = new Promise<string>((resolve) =>
        listener.once("notification", (message) => resolve(message.payload ?? "")),
      )
      await insertEvent(app, { manuscriptId: null, personId, kind: "person.tested", subject: "x" })
      expect(JSON.parse(await heard)).toMatchObject({ personId, kind: "person.tested", subject: "x" })
    } finally {
      listener.release(true)
    }
  })
})

describe("rate limits", () => {
  test("count attempts that come at the same time one by one", async () => {
    const waits = await Promise.all(Array.from({ length: 12 }, () => countAttempt(app, "together", 10, 60)))
    expect(waits.filter((wait) => wait !== null)).toHaveLength(2)
  })

  test("start anew after the window, and forget windows that have ended", async () => {
    expect(await countAttempt(app, "again", 1, 60)).toBeNull()
    expect(await countAttempt(app, "again", 1, 60)).toBeGreaterThan(0)
    await app
      .updateTable("rateLimit")
      .set({ windowEndsAt: sql<Date>`now() - interval '1 second'` })
      .where("key", "=", "again")
      .execute()
    expect(await countAttempt(app, "again", 1, 60)).toBeNull()
    await app
      .updateTable("rateLimit")
      .set({ windowEndsAt: sql<Date>`now() - interval '1 second'` })
      .execute()
    await deleteExpiredRows(app)
    expect(await app.selectFrom("rateLimit").select("key").execute()).toEqual([])
  })
})
