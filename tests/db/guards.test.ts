import { sql } from "kysely"
import { afterAll, beforeAll, describe, expect, test } from "vitest"
import { createDb, type Db } from "@/lib/server/db/client"
import { createPool } from "@/lib/server/db/create-pool"
import { freshDatabase } from "@tests/support/fresh-database"
import {
  type Everything,
  insertFigure,
  insertOneOfEverything,
  lockDraft,
  sha256,
} from "@tests/support/one-of-everything"

/** The error of a statement, as its SQLSTATE; "none" when it went through. */
async function stateOf(statement: Promise<unknown>): Promise<string> {
  try {
    await statement
    return "none"
  } catch (error) {
    return (error as { code?: string }).code ?? String(error)
  }
}

const frozen = "AQ423"
const refused = "42501" // insufficient_privilege

let app: Db
let owner: Db
let database: Awaited<ReturnType<typeof freshDatabase>>

beforeAll(async () => {
  database = await freshDatabase()
  app = createDb(createPool(database.appUrl, 4))
  owner = createDb(createPool(database.ownerUrl, 2))
})
afterAll(async () => {
  await Promise.all([app.destroy(), owner.destroy()])
  await database.drop()
})

/** Updates that write a row over with itself: only a guard or a missing right can refuse them. */
const rows: Record<string, (all: Everything) => ReturnType<typeof sql<boolean>>> = {
  draft: (all) => sql`id = ${all.draftId}`,
  draft_figure: (all) => sql`draft_id = ${all.draftId}`,
  sign_off: (all) => sql`draft_id = ${all.draftId}`,
  figure_version: (all) => sql`id = ${all.figureVersionId}`,
  figure_version_input: (all) => sql`figure_version_id = ${all.figureVersionId}`,
  result: (all) => sql`figure_version_id = ${all.figureVersionId}`,
  rendering: (all) => sql`figure_version_id = ${all.figureVersionId}`,
  dataset_version: (all) => sql`id = ${all.datasetVersionId}`,
  dataset_column: (all) => sql`dataset_version_id = ${all.datasetVersionId}`,
  column_chunk: (all) => sql`dataset_version_id = ${all.datasetVersionId}`,
  blob: (all) => sql`id = ${all.blobId}`,
  blob_chunk: (all) => sql`blob_id = ${all.blobId}`,
  event: () => sql`true`,
}
const firstColumn: Record<string, string> = {
  draft: "title",
  draft_figure: "caption",
  sign_off: "withdrawn_at",
  figure_version: "message",
  figure_version_input: "dataset_name",
  result: "document",
  rendering: "bytes",
  dataset_version: "recipe",
  dataset_column: "unit",
  column_chunk: "data",
  blob: "size",
  blob_chunk: "data",
  event: "kind",
}

describe("a locked draft and all it holds", () => {
  let all: Everything
  beforeAll(async () => {
    all = await insertOneOfEverything(app)
    await app.insertInto("event").values({ kind: "draft.locked", manuscriptId: all.manuscriptId }).execute()
    await lockDraft(app, all)
  })

  describe.each(Object.keys(rows))("%s", (table) => {
    const where = () => rows[table]?.(all) ?? sql`false`
    const update = (db: Db) =>
      sql`update ${sql.table(table)} set ${sql.ref(firstColumn[table] ?? "")} = ${sql.ref(firstColumn[table] ?? "")}
        where ${where()}`.execute(db)
    const remove = (db: Db) => sql`delete from ${sql.table(table)} where ${where()}`.execute(db)

    test("has the row that is tried", async () => {
      const { rows: found } = await sql`select from ${sql.table(table)} where ${where()}`.execute(app)
      expect(found.length).toBeGreaterThan(0)
    })
    test("is not changed, by the application or by the owner", async () => {
      expect([frozen, refused]).toContain(await stateOf(update(app)))
      expect(await stateOf(update(owner))).toBe(frozen)
    })
    test("is not deleted, by the application or by the owner", async () => {
      expect([frozen, refused]).toContain(await stateOf(remove(app)))
      expect(await stateOf(remove(owner))).toBe(frozen)
    })
    test("is not emptied", async () => {
      expect(await stateOf(sql`truncate ${sql.table(table)} cascade`.execute(app))).toBe(refused)
      expect(await stateOf(sql`truncate ${sql.table(table)} cascade`.execute(owner))).toBe(frozen)
    })
    test("keeps its guards", async () => {
      const disable = sql`alter table ${sql.table(table)} disable trigger all`.execute(app)
      expect(await stateOf(disable)).toBe(refused)
      expect(await stateOf(sql`drop table ${sql.table(table)}`.execute(app))).toBe(refused)
    })
  })

  test("does not open again", async () => {
    const open = app
      .updateTable("draft")
      .set({ state: "open", lockedAt: null, lockedBy: null })
      .where("id", "=", all.draftId)
    expect(await stateOf(open.execute())).toBe(frozen)
  })

  test("takes no further pin, sign-off, result, rendering or input", async () => {
    const other = await insertFigure(app, {
      manuscriptId: all.manuscriptId,
      author: all.members["co-author"],
      datasetVersionId: all.datasetVersionId,
      name: "front",
      position: 2,
    })
    const pin = app.insertInto("draftFigure").values({
      draftId: all.draftId,
      figureId: other.figureId,
      figureVersionId: other.figureVersionId,
      position: 2,
    })
    expect(await stateOf(pin.execute())).toBe(frozen)
    const signOff = app.insertInto("signOff").values({
      draftId: all.draftId,
      personId: all.members["co-author"],
      digest: sha256("draft 1"),
    })
    expect(await stateOf(signOff.execute())).toBe(frozen)
    const rendering = app.insertInto("rendering").values({
      figureVersionId: all.figureVersionId,
      format: "png",
      dpi: 600,
      bytes: Buffer.from("png"),
      sha256: sha256("png"),
      widthMm: 86,
      heightMm: 64,
    })
    expect(await stateOf(rendering.execute())).toBe(frozen)
    const input = app.insertInto("figureVersionInput").values({
      figureVersionId: all.figureVersionId,
      datasetName: "another",
      datasetVersionId: all.datasetVersionId,
    })
    expect(await stateOf(input.execute())).toBe(frozen)
  })

  test("takes no further column, part of a column or part of the file", async () => {
    const column = app
      .insertInto("datasetColumn")
      .values({ datasetVersionId: all.datasetVersionId, columnIndex: 1, name: "n", kind: "number" })
    expect(await stateOf(column.execute())).toBe(frozen)
    const part = app.insertInto("columnChunk").values({
      datasetVersionId: all.datasetVersionId,
      columnIndex: 0,
      part: 1,
      n: 1,
      data: Buffer.alloc(8),
    })
    expect(await stateOf(part.execute())).toBe(frozen)
    const bytes = app.insertInto("blobChunk").values({ blobId: all.blobId, part: 1, data: Buffer.from("x") })
    expect(await stateOf(bytes.execute())).toBe(frozen)
  })
})

describe("an open draft", () => {
  test("is pinned anew, signed and withdrawn from, and edited", async () => {
    const all = await insertOneOfEverything(app)
    await app.updateTable("draft").set({ title: "First submission" }).where("id", "=", all.draftId).execute()
    await app
      .updateTable("signOff")
      .set({ withdrawnAt: new Date() })
      .where("id", "=", all.signOffId)
      .execute()
    await app.deleteFrom("draftFigure").where("draftId", "=", all.draftId).execute()
    const pinned = { figureId: all.figureId, figureVersionId: all.figureVersionId }
    await app
      .insertInto("draftFigure")
      .values({ draftId: all.draftId, ...pinned, position: 1 })
      .execute()
    expect(
      await app
        .selectFrom("draftFigure")
        .select("position")
        .where("draftId", "=", all.draftId)
        .executeTakeFirst(),
    ).toEqual({ position: 1 })
  })

  test("is not locked without figures, nor with a version that has no result, nor made locked", async () => {
    const all = await insertOneOfEverything(app)
    const { id: figureVersionId } = await app
      .insertInto("figureVersion")
      .values({
        figureId: all.figureId,
        number: 2,
        spec: "{}",
        specSha256: sha256("2"),
        authorId: all.members.reader,
      })
      .returning("id")
      .executeTakeFirstOrThrow()
    await app.updateTable("draftFigure").set({ figureVersionId }).where("draftId", "=", all.draftId).execute()
    await expect(lockDraft(app, all)).rejects.toThrow("Pinned versions without results: decay.")
    await app.deleteFrom("draftFigure").where("draftId", "=", all.draftId).execute()
    await expect(lockDraft(app, all)).rejects.toThrow("without figures")
    const born = app.insertInto("draft").values({
      manuscriptId: all.manuscriptId,
      number: 2,
      title: "Draft 2",
      createdBy: all.members["co-author"],
      state: "locked",
      digest: sha256("x"),
      lockedAt: new Date(),
      lockedBy: all.members["co-author"],
    })
    expect(await stateOf(born.execute())).toBe("AQ409")
  })

  test("pins figures of its own manuscript only", async () => {
    const [one, other] = [await insertOneOfEverything(app), await insertOneOfEverything(app)]
    const pin = app.insertInto("draftFigure").values({
      draftId: one.draftId,
      figureId: other.figureId,
      figureVersionId: other.figureVersionId,
      position: 2,
    })
    expect(await stateOf(pin.execute())).toBe("AQ409")
  })
})

describe("two at once", () => {
  /** Resolves when a backend waits for a lock, so that the order of the two is certain without sleeping. */
  async function untilOneWaits(): Promise<void> {
    for (;;) {
      const { rows: waiting } = await sql`select from pg_stat_activity
        where datname = current_database() and wait_event_type = 'Lock'`.execute(owner)
      if (waiting.length > 0) return
    }
  }

  test("a pin that meets a lock waits for it and is refused", async () => {
    const all = await insertOneOfEverything(app)
    let pin: Promise<string> = Promise.resolve("not tried")
    await app.transaction().execute(async (locking) => {
      await lockDraft(locking, all)
      pin = stateOf(
        app
          .updateTable("draftFigure")
          .set({ caption: "changed" })
          .where("draftId", "=", all.draftId)
          .execute(),
      )
      await untilOneWaits()
    })
    expect(await pin).toBe(frozen)
  })

  test("a lock that meets a pin waits for it and holds what was pinned", async () => {
    const all = await insertOneOfEverything(app)
    let lock: Promise<string> = Promise.resolve("not tried")
    await app.transaction().execute(async (pinning) => {
      await pinning
        .updateTable("draftFigure")
        .set({ caption: "changed" })
        .where("draftId", "=", all.draftId)
        .execute()
      lock = stateOf(lockDraft(app, all))
      await untilOneWaits()
    })
    expect(await lock).toBe("none")
    const { caption } = await app
      .selectFrom("draftFigure")
      .select("caption")
      .where("draftId", "=", all.draftId)
      .executeTakeFirstOrThrow()
    expect(caption).toBe("changed")
  })

  test("a rendering that meets a lock of its version waits for it and is refused", async () => {
    const all = await insertOneOfEverything(app)
    let drawing: Promise<string> = Promise.resolve("not tried")
    await app.transaction().execute(async (locking) => {
      await lockDraft(locking, all)
      drawing = stateOf(
        app
          .insertInto("rendering")
          .values({
            figureVersionId: all.figureVersionId,
            format: "pdf",
            bytes: Buffer.from("pdf"),
            sha256: sha256("pdf"),
            widthMm: 86,
            heightMm: 64,
          })
          .execute(),
      )
      await untilOneWaits()
    })
    expect(await drawing).toBe(frozen)
  })
})

describe("other guards", () => {
  test("inputs are accepted versions of the same manuscript", async () => {
    const [one, other] = [await insertOneOfEverything(app), await insertOneOfEverything(app)]
    const foreign = insertFigure(app, {
      manuscriptId: one.manuscriptId,
      author: one.members.reader,
      datasetVersionId: other.datasetVersionId,
      name: "foreign",
      position: 3,
    })
    expect(await stateOf(foreign)).toBe("AQ409")
  })

  test("a manuscript keeps a corresponding author", async () => {
    const { manuscriptId, members } = await insertOneOfEverything(app)
    const mine = (personId: string) =>
      app.updateTable("membership").where("manuscriptId", "=", manuscriptId).where("personId", "=", personId)
    const author = members["corresponding-author"]
    expect(await stateOf(mine(author).set({ role: "reader" }).execute())).toBe("AQ409")
    const leave = app
      .deleteFrom("membership")
      .where("manuscriptId", "=", manuscriptId)
      .where("personId", "=", author)
    expect(await stateOf(leave.execute())).toBe("AQ409")
    await mine(members["co-author"]).set({ role: "corresponding-author" }).execute()
    expect(await stateOf(leave.execute())).toBe("none")
  })

  test("stored bytes need their blob, and parts may go only before it is written", async () => {
    const blobId = crypto.randomUUID()
    const part = (db: Db) =>
      db
        .insertInto("blobChunk")
        .values({ blobId, part: 0, data: Buffer.from("x") })
        .execute()
    expect(await stateOf(part(app))).toBe("23503")
    await app.transaction().execute(async (trx) => {
      await part(trx)
      await trx.deleteFrom("blobChunk").where("blobId", "=", blobId).execute()
    })
  })

  test("the application may not write tables that it has no business with", async () => {
    for (const statement of [
      sql`create table extra (id int)`,
      sql`create function extra() returns int language sql as 'select 1'`,
      sql`delete from person`,
      sql`delete from manuscript`,
      sql`update event set kind = 'x'`,
      sql`select * from kysely_migration`,
      sql`set session_replication_role = replica`,
    ])
      expect(await stateOf(statement.execute(app))).toBe(refused)
  })
})
