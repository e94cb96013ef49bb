import { revokeSignIn } from "@/lib/contracts/accounts"
import { endpoint } from "@/lib/server/http/endpoint"
import { endSignIns } from "@/lib/server/services/accounts/sign-ins"

export const DELETE = endpoint(revokeSignIn, ({ db, actor, params }) =>
  endSignIns(db, actor.person.id, params.signInId),
)
