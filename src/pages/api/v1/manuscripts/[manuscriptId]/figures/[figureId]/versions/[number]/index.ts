import { getFigureVersion as contract } from "@/lib/contracts/figures"
import { endpoint } from "@/lib/server/http/endpoint"
import { getFigureVersion } from "@/lib/server/services/figures/figure-versions"

export const GET = endpoint(contract, ({ db, params }) =>
  getFigureVersion(db, params.manuscriptId, params.figureId, params.number),
)
