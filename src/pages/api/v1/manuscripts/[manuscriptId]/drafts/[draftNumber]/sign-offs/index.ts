import { signOff as contract } from "@/lib/contracts/drafts"
import { endpoint } from "@/lib/server/http/endpoint"
import { signOff } from "@/lib/server/services/drafts/sign-and-lock"

export const POST = endpoint(contract, ({ db, actor, params, body }) =>
  signOff(db, params, actor.person.id, body.digest),
)
