import { acceptDatasetVersion as contract } from "@/lib/contracts/datasets"
import { endpoint } from "@/lib/server/http/endpoint"
import { acceptDatasetVersion } from "@/lib/server/services/datasets/decide-version"

export const POST = endpoint(contract, ({ db, actor, params, body }) =>
  acceptDatasetVersion(db, params, actor.person.id, body.treatAsMissing),
)
