import { refuseDatasetVersion as contract } from "@/lib/contracts/datasets"
import { endpoint } from "@/lib/server/http/endpoint"
import { refuseDatasetVersion } from "@/lib/server/services/datasets/decide-version"

export const POST = endpoint(contract, ({ db, actor, params }) =>
  refuseDatasetVersion(db, params, actor.person.id),
)
