import { sql } from "kysely"
import type { Db } from "@/lib/server/db/client"
import { passwordFits } from "./password-hash"

/** The person of an e-mail address, without regard to case. */
export async function findPersonByEmail(db: Db, email: string) {
  return db
    .selectFrom("person")
    .select(["id", "name", "email", "passwordHash"])
    .where(sql<boolean>`lower(email) = lower(${email.trim()})`)
    .executeTakeFirst()
}

/** The id of the person whose address and password these are, or null, after the same time in either case. */
export async function checkCredentials(db: Db, email: string, password: string): Promise<string | null> {
  const person = await findPersonByEmail(db, email)
  return (await passwordFits(person?.passwordHash, password)) ? (person?.id ?? null) : null
}
