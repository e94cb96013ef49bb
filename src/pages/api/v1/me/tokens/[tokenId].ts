import { revokeToken as contract } from "@/lib/contracts/accounts"
import { endpoint } from "@/lib/server/http/endpoint"
import { revokeToken } from "@/lib/server/services/accounts/tokens"

export const DELETE = endpoint(contract, ({ db, actor, params }) =>
  revokeToken(db, actor.person.id, params.tokenId),
)
