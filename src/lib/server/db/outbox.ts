import type { Db } from "./client"
import { addJob } from "./jobs"

export interface NewMail {
  readonly recipient: string
  readonly subject: string
  readonly text: string
  readonly html?: string
  readonly headers?: Readonly<Record<string, string>>
  readonly sendAfter?: Date
}

/** Puts a mail in the outbox with the job `send-mail` that delivers it, in the transaction that causes it. */
export async function addMail(db: Db, mail: NewMail): Promise<string> {
  const { id } = await db
    .insertInto("outbox")
    .values({
      recipient: mail.recipient,
      subject: mail.subject,
      text: mail.text,
      html: mail.html ?? null,
      headers: JSON.stringify(mail.headers ?? {}),
      ...(mail.sendAfter ? { sendAfter: mail.sendAfter } : {}),
    })
    .returning("id")
    .executeTakeFirstOrThrow()
  await addJob(db, "send-mail", { outboxId: id }, mail.sendAfter ? { runAt: mail.sendAfter } : {})
  return id
}
