import { createHash, randomUUID } from "node:crypto"
import { Problem } from "@/lib/contracts/problems"
import { largestUpload } from "@/lib/contracts/datasets"
import type { Db } from "@/lib/server/db/client"

const partBytes = 1 << 20

/** Pieces of any size as parts of 1 MiB, the last one shorter. */
async function* inParts(pieces: AsyncIterable<Uint8Array>): AsyncGenerator<Buffer> {
  let part = Buffer.allocUnsafe(partBytes)
  let filled = 0
  for await (const piece of pieces) {
    for (let at = 0; at < piece.length;) {
      const n = Math.min(partBytes - filled, piece.length - at)
      part.set(piece.subarray(at, at + n), filled)
      filled += n
      at += n
      if (filled < partBytes) continue
      yield part
      part = Buffer.allocUnsafe(partBytes)
      filled = 0
    }
  }
  if (filled > 0) yield part.subarray(0, filled)
}

export interface StoredBlob {
  readonly id: string
  readonly sha256: Buffer
  readonly size: number
}

/**
 * Streams bytes into the database by content: the same bytes are stored once. Runs in the caller's transaction, so an
 * upload that breaks off leaves nothing.
 *
 * @throws Problem `too-large` as soon as the limit is passed, `invalid-request` for an empty file
 */
export async function storeBlob(
  trx: Db,
  pieces: AsyncIterable<Uint8Array>,
  limit = largestUpload,
): Promise<StoredBlob> {
  const id = randomUUID()
  const hash = createHash("sha256")
  let size = 0
  let part = 0
  for await (const data of inParts(pieces)) {
    size += data.length
    if (size > limit)
      throw new Problem(
        "too-large",
        `The file is larger than ${limit / 1e6} MB, the limit for one file. Nothing was stored.`,
        [],
        { connection: "close" },
      )
    hash.update(data)
    await trx.insertInto("blobChunk").values({ blobId: id, part, data }).execute()
    part += 1
  }
  if (size === 0) throw new Problem("invalid-request", "The file has no bytes.")
  const sha256 = hash.digest()
  // Waits for another upload of the same bytes that is about to write them down.
  const written = await trx
    .insertInto("blob")
    .values({ id, sha256, size })
    .onConflict((conflict) => conflict.column("sha256").doNothing())
    .returning("id")
    .executeTakeFirst()
  if (written) return { id, sha256, size }
  await trx.deleteFrom("blobChunk").where("blobId", "=", id).execute()
  const known = await trx
    .selectFrom("blob")
    .select("id")
    .where("sha256", "=", sha256)
    .executeTakeFirstOrThrow()
  return { id: known.id, sha256, size }
}
