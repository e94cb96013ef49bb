import { getResults as contract } from "@/lib/contracts/figures"
import { bytesResponse } from "@/lib/server/http/bytes-response"
import { endpoint } from "@/lib/server/http/endpoint"
import { getResultBytes } from "@/lib/server/services/figures/version-files"

export const GET = endpoint(contract, async ({ db, params, request }) => {
  const { bytes, sha256 } = await getResultBytes(db, params)
  return bytesResponse(request, bytes, { type: "application/json", sha256, fileName: "results.json" })
})
