import { createDataset as createContract, listDatasets as listContract } from "@/lib/contracts/datasets"
import { endpoint } from "@/lib/server/http/endpoint"
import { createDataset, listDatasets } from "@/lib/server/services/datasets/datasets"

export const GET = endpoint(listContract, async ({ db, params }) => ({
  items: await listDatasets(db, params.manuscriptId),
}))

export const POST = endpoint(createContract, ({ db, actor, params, body }) =>
  createDataset(db, params.manuscriptId, actor.person.id, body),
)
