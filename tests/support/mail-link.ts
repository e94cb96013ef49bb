import type { Db } from "@/lib/server/db/client"

/** The secret of the link in the newest mail to an address. */
export async function linkSecretTo(db: Db, email: string): Promise<string> {
  const mail = await db
    .selectFrom("outbox")
    .select("text")
    .where("recipient", "=", email)
    .orderBy("id", "desc")
    .executeTakeFirstOrThrow()
  const secret = /[?&]token=([\w-]+)/.exec(mail.text)?.[1]
  if (secret === undefined) throw new Error(`The newest mail to ${email} has no link:\n${mail.text}`)
  return secret
}
