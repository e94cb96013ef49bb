import type { Db } from "./client"

export interface NewEvent {
  readonly manuscriptId: string | null
  /** Who did it; null for what the product did by itself. */
  readonly personId: string | null
  /** What happened, as subject.verb: "dataset-version.accepted". */
  readonly kind: string
  /** Id of the row it happened to. */
  readonly subject?: string
  /** What a reader of the history needs besides, without joining: names, numbers. */
  readonly data?: Readonly<Record<string, unknown>>
}

/** Writes a line of the history, in the transaction of what it tells. Listeners hear of it when that commits. */
export async function insertEvent(db: Db, event: NewEvent): Promise<void> {
  await db
    .insertInto("event")
    .values({
      manuscriptId: event.manuscriptId,
      personId: event.personId,
      kind: event.kind,
      subject: event.subject ?? null,
      data: JSON.stringify(event.data ?? {}),
    })
    .execute()
}
