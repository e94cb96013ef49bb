import { acceptInvitation as contract } from "@/lib/contracts/people"
import { endpoint } from "@/lib/server/http/endpoint"
import { acceptInvitation } from "@/lib/server/services/people/accept-invitation"

export const POST = endpoint(contract, ({ db, actor, body, clientAddress }) =>
  acceptInvitation(db, actor, { ...body, clientAddress }),
)
