import { getDataset as contract } from "@/lib/contracts/datasets"
import { endpoint } from "@/lib/server/http/endpoint"
import { getDataset } from "@/lib/server/services/datasets/datasets"

export const GET = endpoint(contract, ({ db, params }) =>
  getDataset(db, params.manuscriptId, params.datasetName),
)
