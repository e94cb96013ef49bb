import { getColumns as contract } from "@/lib/contracts/datasets"
import { endpoint } from "@/lib/server/http/endpoint"
import { columnsFrame } from "@/lib/server/services/datasets/original"

export const GET = endpoint(contract, async ({ db, params }) => {
  const { frame, sha256 } = await columnsFrame(db, params)
  return new Response(frame as Uint8Array<ArrayBuffer>, {
    headers: {
      "content-type": "application/octet-stream",
      "content-length": String(frame.length),
      etag: `"${sha256}"`,
      // An accepted version never changes.
      "cache-control": "private, max-age=86400, immutable",
    },
  })
})
