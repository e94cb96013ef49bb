import { sql } from "kysely"
import { Problem } from "@/lib/contracts/problems"
import { findPersonByEmail } from "@/lib/server/auth/check-credentials"
import { limitAttempts, limitFor, limitFrom } from "@/lib/server/auth/limit-attempts"
import { hashPassword } from "@/lib/server/auth/password-hash"
import { hashOfSecret, newSecret } from "@/lib/server/auth/secret"
import { revokeSignIns } from "@/lib/server/auth/sign-in-rows"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { addMail } from "@/lib/server/db/outbox"
import { linkTo } from "./links"
import { refuseWeakPassword } from "./new-password"

const validMinutes = 60

/**
 * Sends a link to set a new password; to an unknown address nothing, with the same answer on the web.
 *
 * @throws Problem `too-many-requests`
 */
export async function requestPasswordReset(
  db: Db,
  { email, clientAddress }: { email: string; clientAddress: string },
): Promise<void> {
  await limitAttempts(db, limitFrom("password-reset", clientAddress), limitFor("password-reset", email, 5))
  await db.transaction().execute(async (trx) => {
    const person = await findPersonByEmail(trx, email)
    if (person === undefined) return
    const { secret, hash } = newSecret()
    await trx
      .insertInto("passwordReset")
      .values({
        personId: person.id,
        hash,
        expiresAt: sql<Date>`now() + make_interval(mins => ${validMinutes})`,
      })
      .execute()
    await addMail(trx, {
      recipient: person.email,
      subject: "Set a new password",
      text: `Hello ${person.name},

open this page within ${validMinutes} minutes to set a new password:
${linkTo("password-reset", secret)}

The link works once. If you did not ask for it, there is nothing to do; your password stays as it is.
`,
    })
  })
}

/**
 * Sets a new password by a link, spends all open links of that person and signs them out everywhere.
 *
 * @throws Problem `link-used`; `invalid-request` for a weak password, which leaves the link usable
 */
export async function usePasswordReset(
  db: Db,
  { token, password, clientAddress }: { token: string; password: string; clientAddress: string },
): Promise<void> {
  await limitAttempts(db, limitFrom("password-reset-use", clientAddress))
  await db.transaction().execute(async (trx) => {
    const used = await trx
      .updateTable("passwordReset")
      .set({ usedAt: sql<Date>`now()` })
      .where("hash", "=", hashOfSecret(token))
      .where("usedAt", "is", null)
      .where("expiresAt", ">", sql<Date>`now()`)
      .returning("personId")
      .executeTakeFirst()
    if (used === undefined) throw new Problem("link-used")
    await setPassword(trx, used.personId, password, "/password")
    await revokeSignIns(trx, used.personId)
    await insertEvent(trx, { manuscriptId: null, personId: used.personId, kind: "person.password-reset" })
  })
}

/** Sets a password that may be used, spends the open links for another one and tells the person by mail. */
export async function setPassword(
  trx: Db,
  personId: string,
  password: string,
  pointer: string,
): Promise<void> {
  const person = await trx
    .selectFrom("person")
    .select(["name", "email"])
    .where("id", "=", personId)
    .executeTakeFirstOrThrow()
  refuseWeakPassword(password, [person.name, person.email], pointer)
  await trx
    .updateTable("person")
    .set({ passwordHash: await hashPassword(password), updatedAt: sql<Date>`now()` })
    .where("id", "=", personId)
    .execute()
  await trx
    .updateTable("passwordReset")
    .set({ usedAt: sql<Date>`now()` })
    .where("personId", "=", personId)
    .where("usedAt", "is", null)
    .execute()
  await addMail(trx, {
    recipient: person.email,
    subject: "Your password has changed",
    text: `Hello ${person.name},

your password was changed just now. If it was not you, set a new one at once:
${linkTo("password-reset")}
`,
  })
}
