import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { findPersonByEmail } from "./check-credentials"

/** What an identity provider says about a person; the address has been verified by it. */
export interface ProvenIdentity {
  /** Issuer's address. */
  readonly provider: string
  readonly subject: string
  readonly email: string
  readonly name: string
}

/**
 * The person behind an identity: known by it, or by the same verified address (then the identity is added), or new.
 * Both sides have proved the address, so joining them gives nobody another's account. Whom the provider knows may come
 * in also where registration is closed: the group has named that provider as its door.
 */
export async function personOfIdentity(db: Db, identity: ProvenIdentity): Promise<string> {
  return db.transaction().execute(async (trx) => {
    const known = await trx
      .selectFrom("identity")
      .select("personId")
      .where("provider", "=", identity.provider)
      .where("subject", "=", identity.subject)
      .executeTakeFirst()
    if (known !== undefined) return known.personId
    const personId =
      (await findPersonByEmail(trx, identity.email))?.id ??
      (
        await trx
          .insertInto("person")
          .values({ email: identity.email, name: identity.name })
          .returning("id")
          .executeTakeFirstOrThrow()
      ).id
    await trx
      .insertInto("identity")
      .values({ provider: identity.provider, subject: identity.subject, personId })
      .execute()
    await insertEvent(trx, {
      manuscriptId: null,
      personId,
      kind: "person.identity-added",
      data: { provider: identity.provider },
    })
    return personId
  })
}
