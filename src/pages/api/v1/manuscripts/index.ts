import {
  createManuscript as createContract,
  listManuscripts as listContract,
} from "@/lib/contracts/manuscripts"
import { endpoint } from "@/lib/server/http/endpoint"
import { reply } from "@/lib/server/http/reply"
import { createManuscript, listManuscripts } from "@/lib/server/services/manuscripts/manuscripts"

export const GET = endpoint(listContract, async ({ db, actor }) => ({
  items: await listManuscripts(db, actor.person.id),
}))

export const POST = endpoint(createContract, async ({ db, actor, body }) => {
  const manuscript = await createManuscript(db, actor.person.id, body)
  const headers = { location: `/api/v1/manuscripts/${manuscript.id}` }
  return reply(manuscript, { revision: manuscript.revision, headers })
})
