import type { Db } from "@/lib/server/db/client"

/** What happened in a manuscript, newest first; `next` goes into `before` for the following page. */
export async function listHistory(
  db: Db,
  manuscriptId: string,
  { before, limit }: { before?: number | undefined; limit: number },
) {
  const rows = await db
    .selectFrom("event")
    .leftJoin("person", "person.id", "event.personId")
    .select([
      "event.id",
      "event.at",
      "event.kind",
      "event.subject",
      "event.data",
      "person.id as personId",
      "person.name",
    ])
    .where("event.manuscriptId", "=", manuscriptId)
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
