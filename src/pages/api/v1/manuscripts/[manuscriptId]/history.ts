import { listHistory as contract } from "@/lib/contracts/events"
import { endpoint } from "@/lib/server/http/endpoint"
import { listHistory } from "@/lib/server/services/history/history"

export const GET = endpoint(contract, ({ db, params, query }) => listHistory(db, params.manuscriptId, query))
