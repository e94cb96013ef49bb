import { lockDraft as contract } from "@/lib/contracts/drafts"
import { endpoint } from "@/lib/server/http/endpoint"
import { lockDraft } from "@/lib/server/services/drafts/sign-and-lock"

export const POST = endpoint(contract, ({ db, actor, params, body }) =>
  lockDraft(db, params, actor.person.id, body),
)
