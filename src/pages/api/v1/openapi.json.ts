import { contracts } from "@/lib/contracts"
import { openApi } from "@/lib/contracts/openapi"
import { getOpenApi as contract } from "@/lib/contracts/typeset"
import { env } from "@/lib/server/env"
import { endpoint } from "@/lib/server/http/endpoint"

export const GET = endpoint(contract, () =>
  Response.json(openApi(contracts, env().PUBLIC_URL), {
    headers: { "cache-control": "public, max-age=3600" },
  }),
)
