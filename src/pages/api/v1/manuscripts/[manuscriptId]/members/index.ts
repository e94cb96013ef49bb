import { listMembers as contract } from "@/lib/contracts/people"
import { endpoint } from "@/lib/server/http/endpoint"
import { listMembers } from "@/lib/server/services/people/members"

export const GET = endpoint(contract, async ({ db, params }) => ({
  items: await listMembers(db, params.manuscriptId),
}))
