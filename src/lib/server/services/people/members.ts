import type { MemberAnswer } from "@/lib/contracts/people"
import { Problem } from "@/lib/contracts/problems"
import type { Role } from "@/lib/domain/policy"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"

type Member = Omit<MemberAnswer, "since"> & { since: Date }

function selectMembers(db: Db, manuscriptId: string) {
  return db
    .selectFrom("membership")
    .innerJoin("person", "person.id", "membership.personId")
    .select(["membership.personId", "person.name", "person.email", "person.orcid", "membership.role"])
    .select("membership.createdAt as since")
    .where("membership.manuscriptId", "=", manuscriptId)
}

/** Who takes part, in the order in which they came. */
export async function listMembers(db: Db, manuscriptId: string): Promise<Member[]> {
  return selectMembers(db, manuscriptId).orderBy("membership.createdAt").orderBy("person.id").execute()
}

/**
 * Gives a member another role.
 *
 * @throws Problem `not-found`; `conflict` for the last corresponding author (refused by the database)
 */
export async function changeMember(
  db: Db,
  change: { manuscriptId: string; personId: string; role: Role; by: string },
): Promise<Member> {
  const { manuscriptId, personId, role, by } = change
  return db.transaction().execute(async (trx) => {
    const before = await lockMember(trx, manuscriptId, personId)
    await trx
      .updateTable("membership")
      .set({ role })
      .where("manuscriptId", "=", manuscriptId)
      .where("personId", "=", personId)
      .execute()
    await insertEvent(trx, {
      manuscriptId,
      personId: by,
      kind: "member.role-changed",
      subject: personId,
      data: { name: before.name, from: before.role, to: role },
    })
    return selectMembers(trx, manuscriptId)
      .where("membership.personId", "=", personId)
      .executeTakeFirstOrThrow()
  })
}

/**
 * Ends a membership; what the person wrote and made stays.
 *
 * @param by who does it: the person, who leaves, or somebody else, who removes
 * @throws Problem `not-found`; `conflict` for the last corresponding author (refused by the database)
 */
export async function endMembership(
  db: Db,
  { manuscriptId, personId, by }: { manuscriptId: string; personId: string; by: string },
): Promise<void> {
  await db.transaction().execute(async (trx) => {
    const { name } = await lockMember(trx, manuscriptId, personId)
    await trx
      .deleteFrom("membership")
      .where("manuscriptId", "=", manuscriptId)
      .where("personId", "=", personId)
      .execute()
    await insertEvent(trx, {
      manuscriptId,
      personId: by,
      kind: personId === by ? "member.left" : "member.removed",
      subject: personId,
      data: { name },
    })
  })
}

async function lockMember(trx: Db, manuscriptId: string, personId: string) {
  const member = await trx
    .selectFrom("membership")
    .innerJoin("person", "person.id", "membership.personId")
    .select(["membership.role", "person.name"])
    .where("membership.manuscriptId", "=", manuscriptId)
    .where("membership.personId", "=", personId)
    .forUpdate("membership")
    .executeTakeFirst()
  if (member === undefined) throw new Problem("not-found")
  return member
}
