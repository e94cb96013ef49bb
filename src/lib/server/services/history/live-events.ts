import type { Actor } from "@/lib/server/auth/actor"
import { isActorLive } from "@/lib/server/auth/is-actor-live"
import { getDb } from "@/lib/server/db/client"
import { findMembership } from "@/lib/server/db/memberships"
import { follow, type LiveEvent } from "./event-hub"

const heartbeatMs = 20_000
/** Lines of the history that a stream catches up on; whoever missed more loads the page again. */
const mostMissed = 200

/** Pieces that a slow reader may leave lying. */
const mostUnread = 1000

/** Events after one that the reader has seen, oldest first; null when there are too many. */
async function missedSince(manuscriptId: string, lastId: number): Promise<LiveEvent[] | null> {
  const events = await getDb()
    .selectFrom("event")
    .select(["id", "manuscriptId", "personId", "kind", "subject"])
    .where("manuscriptId", "=", manuscriptId)
    .where("id", ">", lastId)
    .orderBy("id")
    .limit(mostMissed + 1)
    .execute()
  return events.length > mostMissed ? null : events
}

/** Whether somebody may still follow a manuscript: signed in, the token alive, a member. */
async function mayFollow(actor: Actor, manuscriptId: string): Promise<boolean> {
  const db = getDb()
  if (!(await isActorLive(db, actor))) return false
  return (await findMembership(db, manuscriptId, actor.person.id)) !== undefined
}

function block({ id, kind, subject, manuscriptId: _, ...rest }: LiveEvent): string {
  const data = JSON.stringify({ kind, subject, ...rest })
  return `${id === undefined ? "" : `id: ${id}\n`}event: change\ndata: ${data}\n\n`
}

/** Tells the reader that something was missed, without saying what. */
const gap = block({ kind: "stream.gap", subject: null, manuscriptId: null })

/**
 * Server-sent events of one manuscript for one of its members. Ends when the reader goes, when the server stops, and as
 * soon as the membership, the sign-in or the token ends.
 *
 * @param lastId of the last event the reader has seen, to begin after it; null to begin now
 * @see WHATWG HTML, server-sent events
 */
export async function eventStream(
  manuscriptId: string,
  actor: Actor,
  lastId: number | null,
  signal: AbortSignal,
): Promise<ReadableStream<Uint8Array>> {
  const encoder = new TextEncoder()
  let controller: ReadableStreamDefaultController<Uint8Array> | undefined
  let stopFollowing: () => void = () => {}
  let ended = false
  const write = (text: string) => {
    if (ended || !controller) return
    controller.enqueue(encoder.encode(text))
    // A reader that takes nothing any more must not fill the memory.
    if ((controller.desiredSize ?? 0) < -mostUnread) end()
  }
  const cleanUp = () => {
    ended = true
    clearInterval(heartbeat)
    stopFollowing()
    signal.removeEventListener("abort", end)
  }
  const end = () => {
    if (ended) return
    cleanUp()
    controller?.close()
  }
  const endUnlessAllowed = () => {
    mayFollow(actor, manuscriptId).then((allowed) => allowed || end(), end)
  }
  const heartbeat = setInterval(() => {
    write(": still here\n\n")
    endUnlessAllowed()
  }, heartbeatMs)
  /** What comes while the missed events are looked up waits, so that all stays in order. */
  let waiting: LiveEvent[] | null = []
  const onEvent = (event: LiveEvent) => {
    const concernsReader = event.kind.startsWith("person.") && event.personId === actor.person.id
    if (concernsReader || (event.kind.startsWith("member.") && event.manuscriptId === manuscriptId))
      endUnlessAllowed()
    if (event.manuscriptId !== manuscriptId) return
    if (waiting) waiting.push(event)
    else write(block(event))
  }
  const stream = new ReadableStream<Uint8Array>({
    start: (opened) => {
      controller = opened
    },
    cancel: cleanUp,
  })
  signal.addEventListener("abort", end)
  try {
    stopFollowing = await follow({ onEvent, onGap: () => write(gap), onStop: end })
    // The reader may have gone while the connection was made.
    if (ended) stopFollowing()
    write("retry: 2000\n\n")
    const missed = lastId === null ? [] : await missedSince(manuscriptId, lastId)
    for (const event of missed ?? []) write(block(event))
    if (missed === null) write(gap)
    const sent = missed?.at(-1)?.id ?? 0
    for (const event of waiting) if (event.id === undefined || event.id > sent) write(block(event))
    waiting = null
  } catch (error) {
    end()
    throw error
  }
  return stream
}
