import { listDrafts as listContract, openDraft as openContract } from "@/lib/contracts/drafts"
import { endpoint } from "@/lib/server/http/endpoint"
import { listDrafts, openDraft } from "@/lib/server/services/drafts/drafts"

export const GET = endpoint(listContract, async ({ db, params }) => ({
  items: await listDrafts(db, params.manuscriptId),
}))

export const POST = endpoint(openContract, ({ db, actor, params }) =>
  openDraft(db, params.manuscriptId, actor.person.id),
)
