import { getDraft as contract } from "@/lib/contracts/drafts"
import { endpoint } from "@/lib/server/http/endpoint"
import { reply } from "@/lib/server/http/reply"
import { getDraft } from "@/lib/server/services/drafts/drafts"

export const GET = endpoint(contract, async ({ db, params }) => {
  const draft = await getDraft(db, params)
  return reply(draft, { revision: draft.revision })
})
