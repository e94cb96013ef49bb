import type { Db } from "@/lib/server/db/client"

/** The bytes of a blob, a part of 1 MiB at a time. */
export async function* readBlob(db: Db, blobId: string): AsyncGenerator<Buffer> {
  for (let part = 0; ; part += 1) {
    const row = await db
      .selectFrom("blobChunk")
      .select("data")
      .where("blobId", "=", blobId)
      .where("part", "=", part)
      .executeTakeFirst()
    if (!row) return
    yield row.data
  }
}

/** An async iterator as a web stream that is pulled, so that a slow reader slows the database down. */
export function streamOf(pieces: AsyncGenerator<Uint8Array>): ReadableStream<Uint8Array> {
  return new ReadableStream({
    async pull(controller) {
      const { done, value } = await pieces.next()
      if (done) controller.close()
      else controller.enqueue(value)
    },
    async cancel() {
      await pieces.return(undefined)
    },
  })
}
