import { listDatasets as contract } from "@/lib/contracts/datasets"
import { endpoint } from "@/lib/server/http/endpoint"
import { listDatasets } from "@/lib/server/services/datasets/datasets"

export const GET = endpoint(contract, async ({ db, params }) => ({
  items: await listDatasets(db, params.manuscriptId),
}))
