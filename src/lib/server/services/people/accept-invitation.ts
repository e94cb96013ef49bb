import { sql } from "kysely"
import { Problem } from "@/lib/contracts/problems"
import type { Actor } from "@/lib/server/auth/actor"
import { findPersonByEmail } from "@/lib/server/auth/check-credentials"
import { limitAttempts, limitFrom } from "@/lib/server/auth/limit-attempts"
import { hashOfSecret } from "@/lib/server/auth/secret"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { openAccount } from "@/lib/server/services/accounts/registration"

function selectOpen(db: Db, token: string) {
  return db
    .selectFrom("invitation")
    .innerJoin("manuscript", "manuscript.id", "invitation.manuscriptId")
    .innerJoin("person", "person.id", "invitation.invitedBy")
    .select(["invitation.id", "invitation.manuscriptId", "invitation.email", "invitation.role"])
    .select(["invitation.message", "invitation.expiresAt", "person.name as invitedBy"])
    .select("manuscript.title as manuscriptTitle")
    .where("invitation.hash", "=", hashOfSecret(token))
    .where("invitation.acceptedAt", "is", null)
    .where("invitation.revokedAt", "is", null)
    .where("invitation.expiresAt", ">", sql<Date>`now()`)
}

/** What a link offers, without using it. @throws Problem `link-used`, `too-many-requests` */
export async function lookAtInvitation(db: Db, token: string, clientAddress: string) {
  await limitAttempts(db, limitFrom("invitation-look", clientAddress))
  const invitation = await selectOpen(db, token).executeTakeFirst()
  if (invitation === undefined) throw new Problem("link-used")
  return {
    ...invitation,
    hasAccount: (await findPersonByEmail(db, invitation.email)) !== undefined,
  }
}

/**
 * Makes a member of whoever holds the link: the person who is signed in, or a new one with the invited address, which
 * the link has proved.
 *
 * @throws Problem `link-used`; `not-signed-in` when the address has an account; `conflict` for a member;
 *   `invalid-request` for a weak password, which leaves the link usable
 */
export async function acceptInvitation(
  db: Db,
  actor: Actor | null,
  given: { token: string; account?: { name: string; password: string }; clientAddress: string },
): Promise<{ manuscriptId: string; email: string }> {
  await limitAttempts(db, limitFrom("invitation-accept", given.clientAddress))
  return db.transaction().execute(async (trx) => {
    const invitation = await selectOpen(trx, given.token).forUpdate("invitation").executeTakeFirst()
    if (invitation === undefined) throw new Problem("link-used")
    const { manuscriptId, role } = invitation
    const person = actor?.person ?? (await openInvitedAccount(trx, invitation.email, given.account))
    const joined = await trx
      .insertInto("membership")
      .values({ manuscriptId, personId: person.id, role })
      .onConflict((conflict) => conflict.doNothing())
      .executeTakeFirst()
    if (joined.numInsertedOrUpdatedRows === 0n)
      throw new Problem("conflict", "You take part in this manuscript already.")
    await trx
      .updateTable("invitation")
      .set({ acceptedAt: sql<Date>`now()`, acceptedBy: person.id })
      .where("id", "=", invitation.id)
      .execute()
    await insertEvent(trx, {
      manuscriptId,
      personId: person.id,
      kind: "member.joined",
      subject: person.id,
      data: { name: person.name, role },
    })
    return { manuscriptId, email: person.email }
  })
}

async function openInvitedAccount(
  trx: Db,
  email: string,
  account: { name: string; password: string } | undefined,
): Promise<Actor["person"]> {
  if ((await findPersonByEmail(trx, email)) !== undefined)
    throw new Problem("not-signed-in", `${email} has an account: sign in, then accept.`)
  if (account === undefined)
    throw new Problem("invalid-request", "Give a name and a password for the new account.", [
      { pointer: "/account", code: "missing", message: "Give a name and a password for the new account." },
    ])
  const id = await openAccount(trx, { ...account, email, pointer: "/account/password" })
  return { id, name: account.name, email }
}
