import { settleThread as contract } from "@/lib/contracts/threads"
import { endpoint } from "@/lib/server/http/endpoint"
import { settleThread } from "@/lib/server/services/review/threads"

export const PATCH = endpoint(contract, ({ db, actor, params, body }) =>
  settleThread(db, params.manuscriptId, params.threadId, actor.person.id, body),
)
