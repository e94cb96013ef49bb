import { csvLine, csvText } from "@/lib/domain/csv"
import type { Db } from "@/lib/server/db/client"

function events(db: Db, manuscriptId: string) {
  return db
    .selectFrom("event")
    .leftJoin("person", "person.id", "event.personId")
    .select(["event.id", "event.at", "event.kind", "event.subject", "event.data"])
    .select(["person.id as personId", "person.name"])
    .where("event.manuscriptId", "=", manuscriptId)
}

/** What happened in a manuscript, newest first; `next` goes into `before` for the following page. */
export async function listHistory(
  db: Db,
  manuscriptId: string,
  { before, limit }: { before?: number | undefined; limit: number },
) {
  const rows = await events(db, manuscriptId)
    .$if(before !== undefined, (query) => query.where("event.id", "<", before!))
    .orderBy("event.id", "desc")
    .limit(limit + 1)
    .execute()
  const items = rows.slice(0, limit).map(({ personId, name, ...event }) => ({
    ...event,
    person: personId && name ? { id: personId, name } : null,
  }))
  return { items, next: rows.length > limit ? items.at(-1)!.id : null }
}

/** Lines of the history that are read at a time. */
const batch = 1000

/** The whole history as CSV, oldest first, in pieces. */
export async function* historyCsv(db: Db, manuscriptId: string): AsyncGenerator<Uint8Array> {
  const encoder = new TextEncoder()
  yield encoder.encode(csvLine(["id", "at", "person", "kind", "subject", "data"]))
  for (let after = 0; ;) {
    const rows = await events(db, manuscriptId)
      .where("event.id", ">", after)
      .orderBy("event.id")
      .limit(batch)
      .execute()
    for (const { id, at, name, kind, subject, data } of rows)
      yield encoder.encode(
        csvLine([id, at.toISOString(), csvText(name ?? ""), kind, subject, JSON.stringify(data)]),
      )
    if (rows.length < batch) return
    after = rows.at(-1)!.id
  }
}
