import { listQuantities as contract } from "@/lib/contracts/drafts"
import { endpoint } from "@/lib/server/http/endpoint"
import { listQuantities } from "@/lib/server/services/drafts/draft-quantities"

export const GET = endpoint(contract, async ({ db, params }) => ({ items: await listQuantities(db, params) }))
