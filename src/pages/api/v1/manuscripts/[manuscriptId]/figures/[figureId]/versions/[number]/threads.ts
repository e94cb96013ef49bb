import { listThreads as listContract, startThread as startContract } from "@/lib/contracts/threads"
import { endpoint } from "@/lib/server/http/endpoint"
import { listThreads, startThread } from "@/lib/server/services/review/threads"

export const GET = endpoint(listContract, async ({ db, params }) => ({
  items: await listThreads(db, params.manuscriptId, params.figureId, params.number),
}))

export const POST = endpoint(startContract, ({ db, actor, params, body }) =>
  startThread(db, params, actor.person.id, body),
)
