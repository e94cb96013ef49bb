import { sql } from "kysely"
import { Problem } from "@/lib/contracts/problems"
import type { Role } from "@/lib/domain/policy"
import type { Actor } from "@/lib/server/auth/actor"
import { findPersonByEmail } from "@/lib/server/auth/check-credentials"
import { limitAttempts, limitFor } from "@/lib/server/auth/limit-attempts"
import { newSecret } from "@/lib/server/auth/secret"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { findMembership } from "@/lib/server/db/memberships"
import { addMail } from "@/lib/server/db/outbox"
import { linkTo } from "@/lib/server/services/accounts/links"

const validDays = 14

const roleWords: Record<Role, string> = {
  "corresponding-author": "corresponding author",
  "co-author": "co-author",
  reader: "reader",
}

/** Invitations of a manuscript that wait for an answer, newest first. */
export async function listInvitations(db: Db, manuscriptId: string) {
  const rows = await db
    .selectFrom("invitation")
    .innerJoin("person", "person.id", "invitation.invitedBy")
    .select(["invitation.id", "invitation.email", "invitation.role", "invitation.message"])
    .select(["invitation.createdAt", "invitation.expiresAt", "person.id as inviterId", "person.name"])
    .where("invitation.manuscriptId", "=", manuscriptId)
    .where("invitation.acceptedAt", "is", null)
    .where("invitation.revokedAt", "is", null)
    .where("invitation.expiresAt", ">", sql<Date>`now()`)
    .orderBy("invitation.createdAt", "desc")
    .execute()
  return rows.map(({ inviterId, name, ...row }) => ({ ...row, invitedBy: { id: inviterId, name } }))
}

/**
 * Invites a person by mail. An open invitation of the same address is taken back, so that one link works at a time.
 *
 * @throws Problem `conflict` for a member; `too-many-requests`
 */
export async function invite(
  db: Db,
  actor: Actor,
  invitation: { manuscriptId: string; email: string; role: Role; message: string },
) {
  const { manuscriptId, email, role, message } = invitation
  await limitAttempts(
    db,
    limitFor("invitations by", actor.person.email, 60),
    limitFor("invitation", `${email} to ${manuscriptId}`, 5),
  )
  const { secret, hash } = newSecret()
  return db.transaction().execute(async (trx) => {
    const known = await findPersonByEmail(trx, email)
    if (known !== undefined && (await findMembership(trx, manuscriptId, known.id)) !== undefined)
      throw new Problem("conflict", `${known.name} takes part already.`)
    const { title } = await trx
      .selectFrom("manuscript")
      .select("title")
      .where("id", "=", manuscriptId)
      .executeTakeFirstOrThrow()
    await trx
      .updateTable("invitation")
      .set({ revokedAt: sql<Date>`now()` })
      .where("manuscriptId", "=", manuscriptId)
      .where(sql<boolean>`lower(email) = lower(${email})`)
      .where("acceptedAt", "is", null)
      .where("revokedAt", "is", null)
      .execute()
    const row = await trx
      .insertInto("invitation")
      .values({
        ...invitation,
        hash,
        invitedBy: actor.person.id,
        expiresAt: sql<Date>`now() + make_interval(days => ${validDays})`,
      })
      .returning(["id", "email", "role", "message", "createdAt", "expiresAt"])
      .executeTakeFirstOrThrow()
    await insertEvent(trx, {
      manuscriptId,
      personId: actor.person.id,
      kind: "invitation.sent",
      subject: row.id,
      data: { email, role },
    })
    await addMail(trx, {
      recipient: email,
      subject: `${actor.person.name} invites you to a manuscript`,
      text: `${actor.person.name} invites you to take part in the manuscript

  ${title}

as ${roleWords[role]}.${message === "" ? "" : `\n\n${message}`}

Open this page within ${validDays} days to answer:
${linkTo("invitation", secret)}
`,
    })
    return { ...row, invitedBy: { id: actor.person.id, name: actor.person.name } }
  })
}

/** Takes an open invitation back. @throws Problem `not-found` when it is not open or of another manuscript */
export async function revokeInvitation(
  db: Db,
  { manuscriptId, invitationId, by }: { manuscriptId: string; invitationId: string; by: string },
): Promise<void> {
  await db.transaction().execute(async (trx) => {
    const revoked = await trx
      .updateTable("invitation")
      .set({ revokedAt: sql<Date>`now()` })
      .where("id", "=", invitationId)
      .where("manuscriptId", "=", manuscriptId)
      .where("acceptedAt", "is", null)
      .where("revokedAt", "is", null)
      .returning("email")
      .executeTakeFirst()
    if (revoked === undefined) throw new Problem("not-found")
    await insertEvent(trx, {
      manuscriptId,
      personId: by,
      kind: "invitation.revoked",
      subject: invitationId,
      data: { email: revoked.email },
    })
  })
}
