import { sql } from "kysely"
import { Problem } from "@/lib/contracts/problems"
import type { MailPreference } from "@/lib/domain/states"
import type { Actor } from "@/lib/server/auth/actor"
import { limitAttempts, limitFor } from "@/lib/server/auth/limit-attempts"
import { passwordFits } from "@/lib/server/auth/password-hash"
import { revokeSignIns } from "@/lib/server/auth/sign-in-rows"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { setPassword } from "./password-reset"

/** One's own account. */
export async function readProfile(db: Db, personId: string) {
  return db
    .selectFrom("person")
    .select(["id", "name", "email", "orcid", "mail", "createdAt"])
    .select(sql<boolean>`password_hash is not null`.as("hasPassword"))
    .where("id", "=", personId)
    .executeTakeFirstOrThrow()
}

/** Changes what is given and answers with the whole. */
export async function changeProfile(
  db: Db,
  personId: string,
  change: { name?: string; orcid?: string | null; mail?: MailPreference },
) {
  await db
    .updateTable("person")
    .set({ ...change, updatedAt: sql<Date>`now()` })
    .where("id", "=", personId)
    .execute()
  return readProfile(db, personId)
}

/**
 * Changes one's password and signs out every other browser. Whoever came by an identity provider sets a first one and
 * has no present one to name.
 *
 * @throws Problem `wrong-credentials`, `too-many-requests`, `invalid-request` for a weak password
 */
export async function changePassword(
  db: Db,
  actor: Actor,
  { current, next }: { current: string | null; next: string },
): Promise<void> {
  const { id, email } = actor.person
  await limitAttempts(db, limitFor("password-change", email, 10))
  await db.transaction().execute(async (trx) => {
    const { passwordHash } = await trx
      .selectFrom("person")
      .select("passwordHash")
      .where("id", "=", id)
      .executeTakeFirstOrThrow()
    if (passwordHash !== null && !(await passwordFits(passwordHash, current ?? "")))
      throw new Problem("wrong-credentials", "Your present password is another one.", [
        { pointer: "/current", code: "wrong_password", message: "Your present password is another one." },
      ])
    await setPassword(trx, id, next, "/next")
    await revokeSignIns(trx, id, { except: actor.by.id })
    await insertEvent(trx, { manuscriptId: null, personId: id, kind: "person.password-changed" })
  })
}
