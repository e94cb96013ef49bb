import {
  changeDatasetVersion as changeContract,
  getDatasetVersion as getContract,
} from "@/lib/contracts/datasets"
import { endpoint } from "@/lib/server/http/endpoint"
import { getDatasetVersion } from "@/lib/server/services/datasets/datasets"
import { changeDatasetVersion } from "@/lib/server/services/datasets/decide-version"

export const GET = endpoint(getContract, ({ db, params }) =>
  getDatasetVersion(db, params.manuscriptId, params.datasetName, params.number),
)

export const PATCH = endpoint(changeContract, ({ db, actor, params, body }) =>
  changeDatasetVersion(db, params, actor.person.id, body),
)
