import { createHash } from "node:crypto"
import { sql } from "kysely"
import { Problem } from "@/lib/contracts/problems"
import type { Db } from "@/lib/server/db/client"

/** Answers are kept this long; a request whose process died is given up after five minutes. */
const forgetting = sql`(status is null and created_at < now() - interval '5 minutes')
  or created_at < now() - interval '24 hours'`

const keptHeaders = ["content-type", "etag", "location"]

/**
 * Answers a repeated creating request with what the first one was answered, instead of creating twice.
 *
 * @param answer makes the answer; only one that succeeded is kept, so that a failed request may be sent again
 * @throws Problem `conflict` when the key came with another request, or the first one is still being worked on
 */
export async function onceByKey(
  db: Db,
  personId: string,
  request: Request,
  bodyText: string,
  answer: () => Promise<Response>,
): Promise<Response> {
  const key = request.headers.get("idempotency-key")
  if (key === null) return answer()
  if (key.length < 1 || key.length > 200)
    throw new Problem("invalid-request", "An Idempotency-Key has 1 to 200 characters.")
  const sha256 = createHash("sha256")
    .update(`${request.method} ${new URL(request.url).pathname}\n${bodyText}`)
    .digest()
  const mine = { personId, key }
  await db
    .deleteFrom("idempotencyKey")
    .where("personId", "=", personId)
    .where(sql<boolean>`${forgetting}`)
    .execute()
  const claimed = await db
    .insertInto("idempotencyKey")
    .values({ ...mine, requestSha256: sha256 })
    .onConflict((conflict) => conflict.doNothing())
    .returning("key")
    .executeTakeFirst()
  if (claimed === undefined) return earlierAnswer(db, mine, sha256)
  const release = () =>
    db.deleteFrom("idempotencyKey").where("personId", "=", personId).where("key", "=", key).execute()
  let response: Response
  try {
    response = await answer()
  } catch (error) {
    await release()
    throw error
  }
  const headers = keptHeaders.flatMap((name) => {
    const value = response.headers.get(name)
    return value === null ? [] : [[name, value]]
  })
  await db
    .updateTable("idempotencyKey")
    .set({
      status: response.status,
      headers: JSON.stringify(Object.fromEntries(headers)),
      body: await response.clone().text(),
    })
    .where("personId", "=", personId)
    .where("key", "=", key)
    .execute()
  return response
}

async function earlierAnswer(
  db: Db,
  { personId, key }: { personId: string; key: string },
  sha256: Buffer,
): Promise<Response> {
  const earlier = await db
    .selectFrom("idempotencyKey")
    .select(["requestSha256", "status", "headers", "body"])
    .where("personId", "=", personId)
    .where("key", "=", key)
    .executeTakeFirst()
  if (earlier !== undefined && !earlier.requestSha256.equals(sha256))
    throw new Problem("conflict", "This Idempotency-Key came with another request before.")
  if (earlier?.status == null)
    throw new Problem(
      "conflict",
      "The first request with this Idempotency-Key is still being worked on.",
      [],
      {
        "retry-after": "1",
      },
    )
  return new Response(earlier.status === 204 ? null : earlier.body, {
    status: earlier.status,
    headers: { ...(earlier.headers as Record<string, string>), "idempotent-replay": "true" },
  })
}
