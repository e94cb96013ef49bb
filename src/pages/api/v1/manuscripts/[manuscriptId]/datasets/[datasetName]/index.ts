import { changeDataset as changeContract, getDataset as getContract } from "@/lib/contracts/datasets"
import { endpoint } from "@/lib/server/http/endpoint"
import { changeDataset, getDataset } from "@/lib/server/services/datasets/datasets"

export const GET = endpoint(getContract, ({ db, params }) =>
  getDataset(db, params.manuscriptId, params.datasetName),
)

export const PATCH = endpoint(changeContract, ({ db, actor, params, body }) =>
  changeDataset(db, params.manuscriptId, actor.person.id, params.datasetName, body.description),
)
