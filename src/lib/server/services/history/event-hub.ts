import type { PoolClient } from "pg"
import { getPool } from "@/lib/server/db/client"

/** What the database tells of a line of the history, or of a job's progress (which has no id). */
export interface LiveEvent {
  readonly id?: number
  readonly manuscriptId: string | null
  readonly personId?: string | null
  readonly kind: string
  readonly subject: string | null
}

export interface Follower {
  readonly onEvent: (event: LiveEvent) => void
  /** The connection was lost for a while: something may have been missed. */
  readonly onGap: () => void
  readonly onStop: () => void
}

const channels = ["afterquench_event", "afterquench_progress"] as const
const retryMs = 1000
const followers = new Set<Follower>()
let connection: Promise<void> | undefined
let stopping = false

/** One connection of the process listens for all who follow. */
function listen(): Promise<void> {
  connection ??= connect().catch((error: unknown) => {
    connection = undefined
    throw error
  })
  return connection
}

async function connect(): Promise<void> {
  const client = await getPool().connect()
  client.on("notification", ({ payload }) => {
    const event = JSON.parse(payload ?? "{}") as LiveEvent
    for (const follower of followers) follower.onEvent(event)
  })
  client.once("error", () => lose(client))
  client.once("end", () => lose(client))
  for (const channel of channels) await client.query(`listen ${channel}`)
}

const lost = new WeakSet<PoolClient>()

function lose(client: PoolClient): void {
  if (lost.has(client)) return
  lost.add(client)
  connection = undefined
  client.release(true)
  if (followers.size > 0 && !stopping) void reconnect()
}

async function reconnect(): Promise<void> {
  try {
    await listen()
    for (const follower of followers) follower.onGap()
  } catch (error) {
    console.error(`live events: no connection, trying again: ${(error as Error).message}`)
    setTimeout(() => void reconnect(), retryMs).unref()
  }
}

// server.mjs says so when it stops.
process.once(
  "afterquench:stop" as never,
  (() => {
    stopping = true
    for (const follower of [...followers]) follower.onStop()
  }) as never,
)

/** Follows everything that the database tells. @returns what ends it */
export async function follow(follower: Follower): Promise<() => void> {
  await listen()
  followers.add(follower)
  return () => followers.delete(follower)
}
