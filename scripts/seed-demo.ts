import { Readable } from "node:stream"
import { hashPassword } from "../src/lib/server/auth/password-hash"
import { closeDb, getDb, type Db } from "../src/lib/server/db/client"
import { acceptDatasetVersion } from "../src/lib/server/services/datasets/decide-version"
import { getVersionRow } from "../src/lib/server/services/datasets/datasets"
import { uploadDatasetVersion } from "../src/lib/server/services/datasets/upload"
import { getDraft } from "../src/lib/server/services/drafts/drafts"
import { pinFigures } from "../src/lib/server/services/drafts/pin-figures"
import { createFigure } from "../src/lib/server/services/figures/figures"
import { saveFigureVersion } from "../src/lib/server/services/figures/save-version"
import { createManuscript } from "../src/lib/server/services/manuscripts/manuscripts"
import { addComment, settleThread, startThread } from "../src/lib/server/services/review/threads"
import { demoContent, type DemoContent } from "./demo/demo-content"
import { demoPeople } from "./demo/people"

/** Waits for the worker to read a file; it says why when it cannot. */
async function waitUntilRead(db: Db, manuscriptId: string, name: string): Promise<void> {
  const deadline = Date.now() + 120_000
  for (;;) {
    const { id, state } = await getVersionRow(db, manuscriptId, name, 1)
    if (state === "proposed") return
    if (state === "failed") {
      const { failure } = await db
        .selectFrom("datasetVersion")
        .select("failure")
        .where("id", "=", id)
        .executeTakeFirstOrThrow()
      throw new Error(`The demo's ${name} could not be read: ${JSON.stringify(failure)}`)
    }
    if (Date.now() > deadline)
      throw new Error(`The demo's ${name} was not read in two minutes; does the worker run?`)
    await new Promise((resolve) => setTimeout(resolve, 200))
  }
}

async function insertPeople(db: Db): Promise<string[]> {
  const ids: string[] = []
  for (const { name, email, password } of demoPeople) {
    const person = await db
      .insertInto("person")
      .values({ name, email, passwordHash: await hashPassword(password), emailVerifiedAt: new Date() })
      .returning("id")
      .executeTakeFirstOrThrow()
    ids.push(person.id)
  }
  return ids
}

async function addFigure(
  db: Db,
  manuscriptId: string,
  people: readonly string[],
  figure: DemoContent["figures"][number],
): Promise<string> {
  const { name, title, caption } = figure
  const { id: figureId } = await createFigure(db, manuscriptId, people[0]!, { name, title, caption })
  for (const { by, message, spec } of figure.versions)
    await saveFigureVersion(db, { manuscriptId, figureId }, people[by]!, { spec, message, pins: {} })
  for (const { on, anchor, mustSettle, resolvedBy, comments } of figure.threads) {
    const [first, ...replies] = comments
    const place = { manuscriptId, figureId, number: on }
    const thread = await startThread(db, place, people[first!.by]!, { body: first!.body, anchor, mustSettle })
    for (const { by, body } of replies) await addComment(db, manuscriptId, thread.id, people[by]!, body)
    if (resolvedBy !== null)
      await settleThread(db, manuscriptId, thread.id, people[resolvedBy]!, { resolved: true })
  }
  return figureId
}

/** Fills an empty database with the demo, through the services that people use. */
async function seedDemo(db: Db): Promise<void> {
  const { any } = await db
    .selectNoFrom((eb) => eb.exists(eb.selectFrom("person").select("id")).as("any"))
    .executeTakeFirstOrThrow()
  if (any) return
  console.error("Seeding the demo (its simulations take half a minute, once) …")
  const people = await insertPeople(db)
  const { id: manuscriptId } = await createManuscript(db, people[0]!, demoContent.manuscript)
  for (const [index, { role }] of demoPeople.entries())
    if (index > 0)
      await db.insertInto("membership").values({ manuscriptId, personId: people[index]!, role }).execute()
  for (const { name, fileName, csv } of demoContent.datasets) {
    const bytes = Buffer.from(csv())
    await uploadDatasetVersion(db, {
      manuscriptId,
      datasetName: name,
      fileName,
      personId: people[1]!,
      pieces: Readable.from([bytes]),
      announced: bytes.length,
    })
  }
  for (const { name } of demoContent.datasets) {
    await waitUntilRead(db, manuscriptId, name)
    await acceptDatasetVersion(db, { manuscriptId, datasetName: name, number: 1 }, people[1]!, false)
  }
  const pins: { figureId: string; version: number }[] = []
  for (const figure of demoContent.figures) {
    const figureId = await addFigure(db, manuscriptId, people, figure)
    if (figure.pinned !== null) pins.push({ figureId, version: figure.pinned })
  }
  const place = { manuscriptId, draftNumber: 1 }
  const { revision } = await getDraft(db, place)
  await pinFigures(db, place, people[0]!, pins, revision)
}

try {
  await seedDemo(getDb())
} finally {
  await closeDb()
}
