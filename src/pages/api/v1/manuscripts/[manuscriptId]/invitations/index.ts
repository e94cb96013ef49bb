import { invite as inviteContract, listInvitations as listContract } from "@/lib/contracts/people"
import { endpoint } from "@/lib/server/http/endpoint"
import { invite, listInvitations } from "@/lib/server/services/people/invitations"

export const GET = endpoint(listContract, async ({ db, params }) => ({
  items: await listInvitations(db, params.manuscriptId),
}))

export const POST = endpoint(inviteContract, ({ db, actor, params, body }) =>
  invite(db, actor, { ...params, ...body }),
)
