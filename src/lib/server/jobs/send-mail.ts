import { createTransport, type Transporter } from "nodemailer"
import type { Task } from "graphile-worker"
import { getDb } from "@/lib/server/db/client"
import { env } from "@/lib/server/env"

let transporter: Transporter | undefined

/** Job `send-mail`: delivers one mail of the outbox. A failed attempt is tried again by the queue, later each time. */
export const sendMailJob: Task = async (payload, { job }) => {
  const { outboxId } = payload as { outboxId: string }
  const db = getDb()
  const mail = await db.selectFrom("outbox").selectAll().where("id", "=", outboxId).executeTakeFirst()
  if (!mail || mail.state === "sent") return
  const { SMTP_URL, MAIL_FROM } = env()
  if (!SMTP_URL) throw new Error("SMTP_URL is not set, so mail cannot be sent.")
  transporter ??= createTransport(SMTP_URL)
  const { "Message-ID": messageId, ...headers } = mail.headers as Record<string, string>
  try {
    await transporter.sendMail({
      from: MAIL_FROM,
      to: mail.recipient,
      subject: mail.subject,
      text: mail.text,
      ...(mail.html === null ? {} : { html: mail.html }),
      ...(messageId ? { messageId } : {}),
      headers,
    })
  } catch (error) {
    const last = job.attempts >= job.max_attempts
    await db
      .updateTable("outbox")
      .set((eb) => ({
        attempts: eb("attempts", "+", 1),
        lastError: (error as Error).message,
        ...(last ? { state: "failed" } : {}),
      }))
      .where("id", "=", outboxId)
      .execute()
    throw error
  }
  await db
    .updateTable("outbox")
    .set((eb) => ({ state: "sent", sentAt: new Date(), attempts: eb("attempts", "+", 1), lastError: null }))
    .where("id", "=", outboxId)
    .execute()
}
