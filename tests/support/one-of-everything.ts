import { createHash } from "node:crypto"
import type { Role } from "@/lib/domain/policy"
import type { Db } from "@/lib/server/db/client"

/** SHA-256 of a text, for rows whose hash only has to be there. */
export function sha256(text: string): Buffer {
  return createHash("sha256").update(text).digest()
}

let people = 0

/** A person with an address of their own. */
export async function insertPerson(db: Db, name: string): Promise<string> {
  const email = `${name.toLowerCase().replaceAll(" ", ".")}.${++people}@example.org`
  const { id } = await db
    .insertInto("person")
    .values({ name, email })
    .returning("id")
    .executeTakeFirstOrThrow()
  return id
}

/** One of everything that a manuscript can hold, written row by row so that no service is needed. */
export async function insertOneOfEverything(db: Db) {
  const members = {
    "corresponding-author": await insertPerson(db, "Ilse Brandvold"),
    "co-author": await insertPerson(db, "Teo Marchetti"),
    reader: await insertPerson(db, "Noor Haddad"),
  } satisfies Record<Role, string>
  const author = members["corresponding-author"]
  const id = async (row: Promise<{ id: string }>) => (await row).id

  const manuscriptId = await id(
    db
      .insertInto("manuscript")
      .values({ title: "Rough fronts", createdBy: author })
      .returning("id")
      .executeTakeFirstOrThrow(),
  )
  for (const [role, personId] of Object.entries(members) as [Role, string][])
    await db.insertInto("membership").values({ manuscriptId, personId, role }).execute()
  const invitationId = await id(
    db
      .insertInto("invitation")
      .values({
        manuscriptId,
        email: "invited@example.org",
        role: "reader",
        hash: sha256(`invitation to ${manuscriptId}`),
        invitedBy: author,
        expiresAt: new Date(Date.now() + 86_400_000),
      })
      .returning("id")
      .executeTakeFirstOrThrow(),
  )
  const data = await insertAcceptedDataset(db, manuscriptId, author)
  const figure = await insertFigure(db, { manuscriptId, author, datasetVersionId: data.datasetVersionId })
  const threadId = await id(
    db
      .insertInto("thread")
      .values({ figureVersionId: figure.figureVersionId, createdBy: author })
      .returning("id")
      .executeTakeFirstOrThrow(),
  )
  const commentId = await id(
    db
      .insertInto("comment")
      .values({ threadId, authorId: author, body: "Is the window long enough?" })
      .returning("id")
      .executeTakeFirstOrThrow(),
  )
  const draftId = await id(
    db
      .insertInto("draft")
      .values({ manuscriptId, number: 1, title: "Draft 1", createdBy: author })
      .returning("id")
      .executeTakeFirstOrThrow(),
  )
  const pinned = { figureId: figure.figureId, figureVersionId: figure.figureVersionId }
  await db
    .insertInto("draftFigure")
    .values({ draftId, ...pinned, position: 1 })
    .execute()
  const signOffId = await id(
    db
      .insertInto("signOff")
      .values({ draftId, personId: author, digest: sha256("draft 1") })
      .returning("id")
      .executeTakeFirstOrThrow(),
  )
  return { members, manuscriptId, invitationId, ...data, ...figure, threadId, commentId, draftId, signOffId }
}

export type Everything = Awaited<ReturnType<typeof insertOneOfEverything>>

async function insertAcceptedDataset(db: Db, manuscriptId: string, author: string) {
  const blobId = await db.transaction().execute(async (trx) => {
    const blobId = crypto.randomUUID()
    await trx
      .insertInto("blobChunk")
      .values({ blobId, part: 0, data: Buffer.from("t,n\n1,2\n") })
      .execute()
    await trx
      .insertInto("blob")
      .values({ id: blobId, sha256: sha256(blobId), size: 8 })
      .execute()
    return blobId
  })
  const { id: datasetId } = await db
    .insertInto("dataset")
    .values({ manuscriptId, name: "annihilation", createdBy: author })
    .returning("id")
    .executeTakeFirstOrThrow()
  const { id: datasetVersionId } = await db
    .insertInto("datasetVersion")
    .values({ datasetId, number: 1, fileName: "run.csv", blobId, rows: 1, uploadedBy: author })
    .returning("id")
    .executeTakeFirstOrThrow()
  await db
    .insertInto("datasetColumn")
    .values({ datasetVersionId, columnIndex: 0, name: "t", unit: "1/J", role: "time", kind: "number" })
    .execute()
  await db
    .insertInto("columnChunk")
    .values({
      datasetVersionId,
      columnIndex: 0,
      part: 0,
      n: 1,
      data: Buffer.from(new Float64Array([1]).buffer),
    })
    .execute()
  await db
    .updateTable("datasetVersion")
    .set({ state: "accepted", acceptedBy: author, acceptedAt: new Date() })
    .where("id", "=", datasetVersionId)
    .execute()
  return { blobId, datasetId, datasetVersionId }
}

const spec = {
  version: 1,
  panels: [
    {
      kind: "decay-exponent",
      data: { dataset: "annihilation", columns: { trajectory: "run", time: "t", observable: "n" } },
    },
  ],
}
const results = JSON.stringify({ panels: [] })

/** A figure with one computed and drawn version. */
export async function insertFigure(
  db: Db,
  of: { manuscriptId: string; author: string; datasetVersionId: string; name?: string; position?: number },
) {
  const { id: figureId } = await db
    .insertInto("figure")
    .values({
      manuscriptId: of.manuscriptId,
      name: of.name ?? "decay",
      position: of.position ?? 1,
      createdBy: of.author,
    })
    .returning("id")
    .executeTakeFirstOrThrow()
  const { id: figureVersionId } = await db
    .insertInto("figureVersion")
    .values({
      figureId,
      number: 1,
      spec: JSON.stringify(spec),
      specSha256: sha256("spec"),
      authorId: of.author,
    })
    .returning("id")
    .executeTakeFirstOrThrow()
  await db
    .insertInto("figureVersionInput")
    .values({ figureVersionId, datasetName: "annihilation", datasetVersionId: of.datasetVersionId })
    .execute()
  await db.insertInto("computation").values({ figureVersionId, state: "done" }).execute()
  await db
    .insertInto("result")
    .values({
      figureVersionId,
      document: Buffer.from(results),
      sha256: sha256(results),
      series: Buffer.from("[]"),
      software: "{}",
    })
    .execute()
  const { id: renderingId } = await db
    .insertInto("rendering")
    .values({
      figureVersionId,
      format: "svg",
      bytes: Buffer.from("<svg xmlns='http://www.w3.org/2000/svg'/>"),
      sha256: sha256("svg"),
      widthMm: 86,
      heightMm: 64,
    })
    .returning("id")
    .executeTakeFirstOrThrow()
  return { figureId, figureVersionId, renderingId }
}

/** Locks the draft, as its corresponding author. */
export async function lockDraft(db: Db, { draftId, members }: Everything): Promise<void> {
  await db
    .updateTable("draft")
    .set({
      state: "locked",
      digest: sha256("draft 1"),
      lockedAt: new Date(),
      lockedBy: members["corresponding-author"],
    })
    .where("id", "=", draftId)
    .execute()
}
