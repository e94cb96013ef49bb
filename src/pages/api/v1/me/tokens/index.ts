import { createToken as createContract, listTokens as listContract } from "@/lib/contracts/accounts"
import { endpoint } from "@/lib/server/http/endpoint"
import { createToken, listTokens } from "@/lib/server/services/accounts/tokens"

export const GET = endpoint(listContract, async ({ db, actor }) => ({
  items: await listTokens(db, actor.person.id),
}))

export const POST = endpoint(createContract, ({ db, actor, body }) => createToken(db, actor.person.id, body))
