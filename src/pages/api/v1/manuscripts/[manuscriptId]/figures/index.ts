import { createFigure as createContract, listFigures as listContract } from "@/lib/contracts/figures"
import { endpoint } from "@/lib/server/http/endpoint"
import { reply } from "@/lib/server/http/reply"
import { createFigure, listFigures } from "@/lib/server/services/figures/figures"

export const GET = endpoint(listContract, async ({ db, params }) => ({
  items: await listFigures(db, params.manuscriptId),
}))

export const POST = endpoint(createContract, async ({ db, actor, params, body }) => {
  const figure = await createFigure(db, params.manuscriptId, actor.person.id, body)
  return reply(figure, { revision: figure.revision })
})
