import { encode } from "@auth/core/jwt"
import { newSecret } from "@/lib/server/auth/secret"
import type { TokenScope } from "@/lib/domain/policy"
import type { Db } from "@/lib/server/db/client"

const cookieName = "authjs.session-token"

/** A sign-in of a person as the browser would carry it: its row's id and the cookie header. */
export async function signedIn(
  db: Db,
  personId: string,
  authSecret: string,
): Promise<{ signInId: string; headers: Record<string, string> }> {
  const { id } = await db
    .insertInto("signIn")
    .values({ personId, provider: "password", expiresAt: new Date(Date.now() + 86_400_000) })
    .returning("id")
    .executeTakeFirstOrThrow()
  const value = await encode({ token: { signInId: id }, secret: authSecret, salt: cookieName })
  return { signInId: id, headers: { cookie: `${cookieName}=${value}` } }
}

/** A token of a person and the header that sends it. */
export async function withToken(
  db: Db,
  personId: string,
  scope: TokenScope,
): Promise<{ tokenId: string; headers: Record<string, string> }> {
  const { secret, hash } = newSecret("aq_")
  const { id } = await db
    .insertInto("apiToken")
    .values({
      personId,
      name: scope,
      scope,
      hash,
      prefix: secret.slice(0, 9),
      expiresAt: new Date(Date.now() + 86_400_000),
    })
    .returning("id")
    .executeTakeFirstOrThrow()
  return { tokenId: id, headers: { authorization: `Bearer ${secret}` } }
}
