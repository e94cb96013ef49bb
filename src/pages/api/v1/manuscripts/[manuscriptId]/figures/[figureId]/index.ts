import { changeFigure as changeContract, getFigure as getContract } from "@/lib/contracts/figures"
import { endpoint } from "@/lib/server/http/endpoint"
import { requiredRevision } from "@/lib/server/http/if-match"
import { reply } from "@/lib/server/http/reply"
import { changeFigure, getFigure } from "@/lib/server/services/figures/figures"

export const GET = endpoint(getContract, async ({ db, params }) => {
  const figure = await getFigure(db, params.manuscriptId, params.figureId)
  return reply(figure, { revision: figure.revision })
})

export const PATCH = endpoint(changeContract, async ({ db, actor, params, body, request }) => {
  const revision = requiredRevision(request)
  const figure = await changeFigure(db, params.manuscriptId, actor.person.id, params.figureId, body, revision)
  return reply(figure, { revision: figure.revision })
})
