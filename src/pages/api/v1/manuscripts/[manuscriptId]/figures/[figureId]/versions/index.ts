import { saveFigureVersion as contract } from "@/lib/contracts/figures"
import { endpoint } from "@/lib/server/http/endpoint"
import { saveFigureVersion } from "@/lib/server/services/figures/save-version"

export const POST = endpoint(contract, ({ db, actor, params, body }) =>
  saveFigureVersion(db, params, actor.person.id, body),
)
