import { cancelReading as contract } from "@/lib/contracts/datasets"
import { endpoint } from "@/lib/server/http/endpoint"
import { cancelReading } from "@/lib/server/services/datasets/decide-version"

export const POST = endpoint(contract, ({ db, actor, params }) => cancelReading(db, params, actor.person.id))
