import { changeManuscript as changeContract, getManuscript as getContract } from "@/lib/contracts/manuscripts"
import { endpoint } from "@/lib/server/http/endpoint"
import { requiredRevision } from "@/lib/server/http/if-match"
import { reply } from "@/lib/server/http/reply"
import { changeManuscript, readManuscript } from "@/lib/server/services/manuscripts/manuscripts"

export const GET = endpoint(getContract, async ({ db, actor, params }) => {
  const manuscript = await readManuscript(db, params.manuscriptId, actor.person.id)
  return reply(manuscript, { revision: manuscript.revision })
})

export const PATCH = endpoint(changeContract, async ({ db, actor, params, body, request }) => {
  const revision = requiredRevision(request)
  const manuscript = await changeManuscript(db, params.manuscriptId, actor.person.id, body, revision)
  return reply(manuscript, { revision: manuscript.revision })
})
