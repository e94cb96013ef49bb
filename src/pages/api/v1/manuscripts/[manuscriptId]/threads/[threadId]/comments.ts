import { addComment as contract } from "@/lib/contracts/threads"
import { endpoint } from "@/lib/server/http/endpoint"
import { addComment } from "@/lib/server/services/review/threads"

export const POST = endpoint(contract, ({ db, actor, params, body }) =>
  addComment(db, params.manuscriptId, params.threadId, actor.person.id, body.body),
)
