import type { z } from "zod"
import type { anchor, startThread as startContract } from "@/lib/contracts/threads"
import { Problem } from "@/lib/contracts/problems"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { getVersionRow } from "@/lib/server/services/figures/figure-versions"
import { mailAboutThread } from "./mail-about-thread"

function threads(db: Db) {
  return db
    .selectFrom("thread")
    .innerJoin("figureVersion", "figureVersion.id", "thread.figureVersionId")
    .innerJoin("figure", "figure.id", "figureVersion.figureId")
    .innerJoin("person as starter", "starter.id", "thread.createdBy")
    .leftJoin("person as settler", "settler.id", "thread.resolvedBy")
    .select([
      "thread.id",
      "thread.mustSettle",
      "thread.createdAt",
      "thread.resolvedAt",
      "figureVersion.number as versionNumber",
      "figure.id as figureId",
      "figure.name as figureName",
      "figure.manuscriptId",
      "starter.id as starterId",
      "starter.name as starterName",
      "settler.id as settlerId",
      "settler.name as settlerName",
    ])
    .select((eb) => [eb.ref("thread.anchor").$castTo<z.output<typeof anchor> | null>().as("anchor")])
    .orderBy("thread.id")
}

type Row = Awaited<ReturnType<ReturnType<typeof threads>["executeTakeFirstOrThrow"]>>

/** Threads with their comments, oldest first. */
async function withComments(db: Db, rows: readonly Row[]) {
  if (rows.length === 0) return []
  const comments = await db
    .selectFrom("comment")
    .innerJoin("person", "person.id", "comment.authorId")
    .select(["comment.id", "comment.threadId", "comment.body", "comment.createdAt", "comment.editedAt"])
    .select(["person.id as authorId", "person.name as authorName"])
    .where(
      "comment.threadId",
      "in",
      rows.map((row) => row.id),
    )
    .orderBy("comment.id")
    .execute()
  return rows.map(({ starterId, starterName, settlerId, settlerName, ...row }) => ({
    ...row,
    createdBy: { id: starterId, name: starterName },
    resolvedBy: settlerId && settlerName ? { id: settlerId, name: settlerName } : null,
    comments: comments
      .filter((comment) => comment.threadId === row.id)
      .map(({ authorId, authorName, threadId: _, ...comment }) => ({
        ...comment,
        author: { id: authorId, name: authorName },
      })),
  }))
}

/** The threads on a figure version, oldest first. @throws Problem `not-found` */
export async function listThreads(db: Db, manuscriptId: string, figureId: string, number: number) {
  const version = await getVersionRow(db, manuscriptId, figureId, number)
  return withComments(db, await threads(db).where("thread.figureVersionId", "=", version.id).execute())
}

async function getThread(db: Db, manuscriptId: string, threadId: string) {
  const row = await threads(db)
    .where("thread.id", "=", threadId)
    .where("figure.manuscriptId", "=", manuscriptId)
    .executeTakeFirst()
  if (!row) throw new Problem("not-found", "There is no such thread.")
  const [thread] = await withComments(db, [row])
  return thread!
}

/** Starts a thread with its first comment; the others concerned get a mail. */
export async function startThread(
  db: Db,
  place: { manuscriptId: string; figureId: string; number: number },
  personId: string,
  thread: z.output<NonNullable<typeof startContract.body>>,
) {
  const version = await getVersionRow(db, place.manuscriptId, place.figureId, place.number)
  const id = await db.transaction().execute(async (trx) => {
    const created = await trx
      .insertInto("thread")
      .values({
        figureVersionId: version.id,
        createdBy: personId,
        mustSettle: thread.mustSettle,
        anchor: thread.anchor && JSON.stringify(thread.anchor),
      })
      .returning("id")
      .executeTakeFirstOrThrow()
    await insertComment(trx, place.manuscriptId, created.id, personId, thread.body, "thread.started")
    return created.id
  })
  return getThread(db, place.manuscriptId, id)
}

/** Adds a reply. @throws Problem `not-found` */
export async function addComment(
  db: Db,
  manuscriptId: string,
  threadId: string,
  personId: string,
  body: string,
) {
  await getThread(db, manuscriptId, threadId)
  await db
    .transaction()
    .execute((trx) => insertComment(trx, manuscriptId, threadId, personId, body, "comment.added"))
  return getThread(db, manuscriptId, threadId)
}

async function insertComment(
  trx: Db,
  manuscriptId: string,
  threadId: string,
  authorId: string,
  body: string,
  kind: string,
): Promise<void> {
  const { id } = await trx
    .insertInto("comment")
    .values({ threadId, authorId, body })
    .returning("id")
    .executeTakeFirstOrThrow()
  const thread = await getThread(trx, manuscriptId, threadId)
  await insertEvent(trx, {
    manuscriptId,
    personId: authorId,
    kind,
    subject: threadId,
    data: { figure: thread.figureName, figureId: thread.figureId, number: thread.versionNumber },
  })
  await mailAboutThread(trx, { manuscriptId, thread, commentId: id, authorId, body })
}

/** Resolves or reopens a thread, or changes whether it must be settled. @throws Problem `not-found` */
export async function settleThread(
  db: Db,
  manuscriptId: string,
  threadId: string,
  personId: string,
  change: { resolved?: boolean | undefined; mustSettle?: boolean | undefined },
) {
  const thread = await getThread(db, manuscriptId, threadId)
  await db.transaction().execute(async (trx) => {
    const settled = change.resolved
      ? { resolvedAt: thread.resolvedAt ?? new Date(), resolvedBy: thread.resolvedBy?.id ?? personId }
      : { resolvedAt: null, resolvedBy: null }
    await trx
      .updateTable("thread")
      .set({
        ...(change.resolved === undefined ? {} : settled),
        ...(change.mustSettle === undefined ? {} : { mustSettle: change.mustSettle }),
      })
      .where("id", "=", threadId)
      .execute()
    const kind =
      change.resolved === undefined
        ? "thread.marked"
        : change.resolved
          ? "thread.resolved"
          : "thread.reopened"
    await insertEvent(trx, {
      manuscriptId,
      personId,
      kind,
      subject: threadId,
      data: { figure: thread.figureName, figureId: thread.figureId, number: thread.versionNumber },
    })
  })
  return getThread(db, manuscriptId, threadId)
}
