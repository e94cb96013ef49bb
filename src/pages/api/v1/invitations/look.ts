import { lookAtInvitation as contract } from "@/lib/contracts/people"
import { endpoint } from "@/lib/server/http/endpoint"
import { lookAtInvitation } from "@/lib/server/services/people/accept-invitation"

export const POST = endpoint(contract, ({ db, body, clientAddress }) =>
  lookAtInvitation(db, body.token, clientAddress),
)
