import { pinFigures as contract } from "@/lib/contracts/drafts"
import { endpoint } from "@/lib/server/http/endpoint"
import { requiredRevision } from "@/lib/server/http/if-match"
import { reply } from "@/lib/server/http/reply"
import { pinFigures } from "@/lib/server/services/drafts/pin-figures"

export const PUT = endpoint(contract, async ({ db, actor, params, body, request }) => {
  const draft = await pinFigures(db, params, actor.person.id, body.figures, requiredRevision(request))
  return reply(draft, { revision: draft.revision })
})
