import type { Role } from "@/lib/domain/policy"
import type { Db } from "./client"

export interface Membership {
  readonly manuscriptId: string
  readonly personId: string
  readonly role: Role
}

/** A person's membership in a manuscript, or undefined where there is none. */
export async function findMembership(
  db: Db,
  manuscriptId: string,
  personId: string,
): Promise<Membership | undefined> {
  return db
    .selectFrom("membership")
    .select(["manuscriptId", "personId", "role"])
    .where("manuscriptId", "=", manuscriptId)
    .where("personId", "=", personId)
    .executeTakeFirst()
}
