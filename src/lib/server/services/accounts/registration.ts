import { sql } from "kysely"
import { Problem } from "@/lib/contracts/problems"
import { findPersonByEmail } from "@/lib/server/auth/check-credentials"
import { limitAttempts, limitFor, limitFrom } from "@/lib/server/auth/limit-attempts"
import { hashPassword } from "@/lib/server/auth/password-hash"
import { hashOfSecret, newSecret } from "@/lib/server/auth/secret"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { addMail } from "@/lib/server/db/outbox"
import { env } from "@/lib/server/env"
import { linkTo } from "./links"
import { refuseWeakPassword } from "./new-password"

const validHours = 48

/**
 * Sends the link that proves an address. Someone who has an account already gets a mail that says so; the answer on the
 * web is the same for both, so that nobody learns who has one.
 *
 * @throws Problem `too-many-requests`; `not-allowed` where accounts are opened by invitation only
 */
export async function requestRegistration(
  db: Db,
  { email, name, clientAddress }: { email: string; name: string; clientAddress: string },
): Promise<void> {
  if (!env().OPEN_REGISTRATION)
    throw new Problem("not-allowed", "Accounts are opened by invitation here: ask a corresponding author.")
  await limitAttempts(db, limitFrom("registration", clientAddress), limitFor("registration", email, 5))
  await db.transaction().execute(async (trx) => {
    const known = await findPersonByEmail(trx, email)
    if (known !== undefined) {
      await addMail(trx, {
        recipient: known.email,
        subject: "You have an account already",
        text: `Hello ${known.name},

someone, probably you, asked for an account with this address. You have one: sign in at
${linkTo("sign-in")}
or ask there for a new password. If it was not you, there is nothing to do.
`,
      })
      return
    }
    const { secret, hash } = newSecret()
    await trx
      .insertInto("registration")
      .values({ email, name, hash, expiresAt: sql<Date>`now() + make_interval(hours => ${validHours})` })
      .execute()
    await addMail(trx, {
      recipient: email,
      subject: "Open your account",
      text: `Hello ${name},

open this page within ${validHours} hours to choose a password and open your account:
${linkTo("confirm", secret)}

If you did not ask for an account, there is nothing to do; without the link none is opened.
`,
    })
  })
}

/**
 * Opens the account that a link proves.
 *
 * @throws Problem `link-used`; `invalid-request` for a weak password, which leaves the link usable
 */
export async function confirmRegistration(
  db: Db,
  { token, password, clientAddress }: { token: string; password: string; clientAddress: string },
): Promise<{ email: string }> {
  await limitAttempts(db, limitFrom("confirm", clientAddress))
  return db.transaction().execute(async (trx) => {
    const asked = await trx
      .updateTable("registration")
      .set({ usedAt: sql<Date>`now()` })
      .where("hash", "=", hashOfSecret(token))
      .where("usedAt", "is", null)
      .where("expiresAt", ">", sql<Date>`now()`)
      .returning(["email", "name"])
      .executeTakeFirst()
    if (asked === undefined || (await findPersonByEmail(trx, asked.email)) !== undefined)
      throw new Problem("link-used")
    await openAccount(trx, { ...asked, password, pointer: "/password" })
    return { email: asked.email }
  })
}

/** Writes the person whose address has been proved. @returns their id */
export async function openAccount(
  trx: Db,
  account: { email: string; name: string; password: string; pointer: string },
): Promise<string> {
  refuseWeakPassword(account.password, [account.name, account.email], account.pointer)
  const { id } = await trx
    .insertInto("person")
    .values({
      email: account.email,
      name: account.name,
      passwordHash: await hashPassword(account.password),
    })
    .returning("id")
    .executeTakeFirstOrThrow()
  await insertEvent(trx, { manuscriptId: null, personId: id, kind: "person.account-opened", subject: id })
  return id
}
