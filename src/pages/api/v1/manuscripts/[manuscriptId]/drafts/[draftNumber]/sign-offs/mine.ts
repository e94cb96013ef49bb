import { withdrawSignOff as contract } from "@/lib/contracts/drafts"
import { endpoint } from "@/lib/server/http/endpoint"
import { withdrawSignOff } from "@/lib/server/services/drafts/sign-and-lock"

export const DELETE = endpoint(contract, ({ db, actor, params }) =>
  withdrawSignOff(db, params, actor.person.id),
)
