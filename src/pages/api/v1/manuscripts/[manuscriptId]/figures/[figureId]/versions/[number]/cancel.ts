import { cancelComputation as contract } from "@/lib/contracts/figures"
import { endpoint } from "@/lib/server/http/endpoint"
import { cancelComputation } from "@/lib/server/services/figures/computation"

export const POST = endpoint(contract, ({ db, actor, params }) =>
  cancelComputation(db, params, actor.person.id),
)
