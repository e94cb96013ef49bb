import { revokeInvitation as contract } from "@/lib/contracts/people"
import { endpoint } from "@/lib/server/http/endpoint"
import { revokeInvitation } from "@/lib/server/services/people/invitations"

export const DELETE = endpoint(contract, ({ db, actor, params }) =>
  revokeInvitation(db, { ...params, by: actor.person.id }),
)
