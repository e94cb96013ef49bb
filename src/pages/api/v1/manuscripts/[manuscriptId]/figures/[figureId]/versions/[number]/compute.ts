import { computeAgain as contract } from "@/lib/contracts/figures"
import { endpoint } from "@/lib/server/http/endpoint"
import { computeAgain } from "@/lib/server/services/figures/computation"

export const POST = endpoint(contract, ({ db, actor, params }) => computeAgain(db, params, actor.person.id))
