import { sql } from "kysely"
import { Problem } from "@/lib/contracts/problems"
import type { Actor } from "@/lib/server/auth/actor"
import { limitAttempts, limitFor, limitFrom } from "@/lib/server/auth/limit-attempts"
import { passwordSignIn } from "@/lib/server/auth/password-sign-in"
import { revokeSignIns } from "@/lib/server/auth/sign-in-rows"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { forgetAttempts } from "@/lib/server/db/rate-limits"

/**
 * Signs in with address and password.
 *
 * @returns the cookies to set
 * @throws Problem `wrong-credentials`, the same for an unknown address; `too-many-requests`
 */
export async function signInByPassword(
  db: Db,
  attempt: { email: string; password: string; clientAddress: string; userAgent: string },
): Promise<readonly string[]> {
  const here = limitFor(`sign-in at ${attempt.clientAddress}`, attempt.email, 10)
  // A wider limit over all places: wide enough that a stranger can hardly shut the owner out, narrow for guessing.
  const anywhere = limitFor("sign-in", attempt.email, 100)
  await limitAttempts(db, limitFrom("sign-in", attempt.clientAddress), here, anywhere)
  const cookies = await passwordSignIn(attempt.email, attempt.password, attempt.userAgent)
  if (cookies === null) throw new Problem("wrong-credentials")
  await forgetAttempts(db, here.key)
  return cookies
}

/** Browsers in which a person is signed in, last seen first. */
export async function listSignIns(db: Db, actor: Actor) {
  const rows = await db
    .selectFrom("signIn")
    .select(["id", "provider", "userAgent", "createdAt", "lastSeenAt", "expiresAt"])
    .where("personId", "=", actor.person.id)
    .where("revokedAt", "is", null)
    .where("expiresAt", ">", sql<Date>`now()`)
    .orderBy("lastSeenAt", "desc")
    .execute()
  return rows.map((row) => ({ ...row, current: row.id === actor.by.id }))
}

/**
 * Signs a person out in one browser, or everywhere.
 *
 * @throws Problem `not-found` when the named sign-in is not theirs or has ended
 */
export async function endSignIns(db: Db, personId: string, signInId?: string): Promise<void> {
  await db.transaction().execute(async (trx) => {
    const ended = await revokeSignIns(trx, personId, signInId === undefined ? {} : { only: signInId })
    if (ended === 0 && signInId !== undefined) throw new Problem("not-found")
    await insertEvent(trx, {
      manuscriptId: null,
      personId,
      kind: signInId === undefined ? "person.signed-out-everywhere" : "person.signed-out",
      ...(signInId === undefined ? {} : { subject: signInId }),
    })
  })
}
