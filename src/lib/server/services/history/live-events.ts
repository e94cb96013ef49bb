import type { PoolClient } from "pg"
import { findMembership } from "@/lib/server/db/memberships"
import { getDb, getPool } from "@/lib/server/db/client"

export interface LiveEvent {
  readonly id?: number
  readonly manuscriptId: string | null
  readonly personId?: string | null
  readonly kind: string
  readonly subject: string | null
}
type Listener = (event: LiveEvent) => void

const channels = ["afterquench_event", "afterquench_progress"] as const
const listeners = new Set<Listener>()
let connection: Promise<PoolClient> | undefined

/** One connection of the process listens for all streams; it is opened again after it broke. */
function listen(): Promise<PoolClient> {
  connection ??= (async () => {
    const client = await getPool().connect()
    client.on("notification", ({ payload }) => {
      const event = JSON.parse(payload ?? "{}") as LiveEvent
      for (const listener of listeners) listener(event)
    })
    client.on("error", () => {
      connection = undefined
      client.release(true)
      if (listeners.size > 0) void listen()
    })
    for (const channel of channels) await client.query(`listen ${channel}`)
    return client
  })()
  connection.catch(() => {
    connection = undefined
  })
  return connection
}

const heartbeatMs = 20_000

/** Whether an event can take a member's access away. */
const changesAccess = (kind: string) => kind.startsWith("member.")

/**
 * Server-sent events of one manuscript for one of its members. Ends when the reader goes, when the server stops, and as
 * soon as the membership ends.
 *
 * @see WHATWG HTML, server-sent events
 */
export async function eventStream(
  manuscriptId: string,
  personId: string,
  signal: AbortSignal,
): Promise<ReadableStream<Uint8Array>> {
  await listen()
  const encoder = new TextEncoder()
  let end = () => {}
  return new ReadableStream<Uint8Array>({
    start(controller) {
      const write = (text: string) => controller.enqueue(encoder.encode(text))
      const onEvent = (event: LiveEvent) => {
        if (event.manuscriptId !== manuscriptId) return
        if (changesAccess(event.kind)) {
          void findMembership(getDb(), manuscriptId, personId).then((membership) => {
            if (membership === undefined) end()
          }, end)
        }
        const { id, kind, subject, ...rest } = event
        write(
          `${id === undefined ? "" : `id: ${id}\n`}event: change\ndata: ${JSON.stringify({ kind, subject, ...rest })}\n\n`,
        )
      }
      const heartbeat = setInterval(() => write(": still here\n\n"), heartbeatMs)
      let ended = false
      end = () => {
        if (ended) return
        ended = true
        clearInterval(heartbeat)
        listeners.delete(onEvent)
        process.off("afterquench:stop" as never, end as never)
        signal.removeEventListener("abort", end)
        controller.close()
      }
      listeners.add(onEvent)
      process.on("afterquench:stop" as never, end as never)
      signal.addEventListener("abort", end)
      write("retry: 2000\n\n")
    },
    cancel: () => end(),
  })
}
