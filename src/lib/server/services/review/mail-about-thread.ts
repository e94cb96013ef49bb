import { env } from "@/lib/server/env"
import type { Db } from "@/lib/server/db/client"
import { addMail } from "@/lib/server/db/outbox"

interface Subject {
  readonly manuscriptId: string
  readonly thread: {
    readonly id: string
    readonly figureId: string
    readonly figureName: string
    readonly versionNumber: number
  }
  readonly commentId: string
  readonly authorId: string
  readonly body: string
}

/**
 * Mails a new comment to those concerned: whoever has written in the thread, whoever saved the figure version, and the
 * corresponding authors, as far as they are members now and want mail; never to the one who wrote it. Mails of a thread
 * belong together for the reader's mail program (Message-ID, References).
 */
export async function mailAboutThread(trx: Db, { manuscriptId, thread, commentId, authorId, body }: Subject) {
  const concerned = await trx
    .selectFrom("membership")
    .innerJoin("person", "person.id", "membership.personId")
    .leftJoin("subscription", (join) =>
      join
        .onRef("subscription.personId", "=", "membership.personId")
        .onRef("subscription.manuscriptId", "=", "membership.manuscriptId"),
    )
    .select(["person.email"])
    .where("membership.manuscriptId", "=", manuscriptId)
    .where("membership.personId", "!=", authorId)
    .where((eb) => eb.or([eb("subscription.mail", "is", null), eb("subscription.mail", "=", "each")]))
    .where((eb) =>
      eb.or([
        eb("membership.role", "=", "corresponding-author"),
        eb("membership.personId", "in", (from) =>
          from.selectFrom("comment").select("authorId").where("threadId", "=", thread.id),
        ),
        eb("membership.personId", "in", (from) =>
          from
            .selectFrom("figureVersion")
            .innerJoin("thread", "thread.figureVersionId", "figureVersion.id")
            .select("figureVersion.authorId")
            .where("thread.id", "=", thread.id),
        ),
      ]),
    )
    .execute()
  if (concerned.length === 0) return
  const { title } = await trx
    .selectFrom("manuscript")
    .select("title")
    .where("id", "=", manuscriptId)
    .executeTakeFirstOrThrow()
  const { name } = await trx
    .selectFrom("person")
    .select("name")
    .where("id", "=", authorId)
    .executeTakeFirstOrThrow()
  const host = new URL(env().PUBLIC_URL).hostname
  const address = `${env().PUBLIC_URL}/manuscripts/${manuscriptId}/figures/${thread.figureId}/versions/${thread.versionNumber}#thread-${thread.id}`
  for (const { email } of concerned)
    await addMail(trx, {
      recipient: email,
      subject: `[${title}] ${thread.figureName}, version ${thread.versionNumber}`,
      text: `${name} wrote on ${thread.figureName}, version ${thread.versionNumber}:\n\n${body}\n\nRead and reply: ${address}\n`,
      headers: {
        "Message-ID": `<comment-${commentId}@${host}>`,
        References: `<thread-${thread.id}@${host}>`,
        "In-Reply-To": `<thread-${thread.id}@${host}>`,
      },
    })
}
