import { Problem } from "@/lib/contracts/problems"
import type { Db } from "@/lib/server/db/client"
import { countAttempt } from "@/lib/server/db/rate-limits"

export interface Limit {
  /** What is counted: "sign-in from 192.0.2.1". */
  readonly key: string
  readonly limit: number
  readonly windowSeconds: number
}

const quarterHour = 15 * 60
const hour = 60 * 60

/** Attempts from one address, whoever they are for; a group behind one gateway shares them. */
export function limitFrom(act: string, clientAddress: string): Limit {
  return { key: `${act} from ${networkOf(clientAddress)}`, limit: 60, windowSeconds: quarterHour }
}

/** Attempts concerning one mail address, from wherever. */
export function limitFor(act: string, email: string, limit: number): Limit {
  return { key: `${act} for ${email.toLowerCase()}`, limit, windowSeconds: hour }
}

/**
 * Counts an attempt under each limit.
 *
 * @throws Problem `too-many-requests` with Retry-After when one is passed
 */
export async function limitAttempts(db: Db, ...limits: readonly Limit[]): Promise<void> {
  const waits: number[] = []
  for (const { key, limit, windowSeconds } of limits) {
    const wait = await countAttempt(db, key, limit, windowSeconds)
    if (wait !== null) waits.push(wait)
  }
  if (waits.length === 0) return
  const seconds = Math.max(...waits)
  throw new Problem("too-many-requests", `Try again in ${Math.ceil(seconds / 60)} min.`, [], {
    "retry-after": String(seconds),
  })
}

/** One subscriber of IPv6 holds a /64 and could use a new address at each attempt. */
function networkOf(address: string): string {
  if (!address.includes(":")) return address
  const mapped = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/i.exec(address)?.[1]
  if (mapped !== undefined) return mapped
  const [head = "", tail] = address.split("::")
  const left = head.split(":").filter(Boolean)
  const right = tail?.split(":").filter(Boolean) ?? []
  const groups =
    tail === undefined
      ? left
      : [...left, ...Array<string>(Math.max(0, 8 - left.length - right.length)).fill("0"), ...right]
  return `${groups.slice(0, 4).join(":")}::/64`
}
