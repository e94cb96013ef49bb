import { getColumns as contract } from "@/lib/contracts/datasets"
import { getPool } from "@/lib/server/db/client"
import { endpoint } from "@/lib/server/http/endpoint"
import { columnsFrame } from "@/lib/server/services/datasets/columns-frame"
import { streamOf } from "@/lib/server/services/datasets/read-blob"

export const GET = endpoint(contract, async ({ db, params, query, request }) => {
  const { length, pieces, checksum } = await columnsFrame(db, getPool(), params, [query.names ?? []].flat())
  const headers = {
    etag: `"${checksum}"`,
    // An accepted version never changes.
    "cache-control": "private, max-age=86400, immutable",
  }
  if (request.headers.get("if-none-match") === headers.etag)
    return new Response(null, { status: 304, headers })
  return new Response(streamOf(pieces), {
    headers: { ...headers, "content-type": "application/octet-stream", "content-length": String(length) },
  })
})
