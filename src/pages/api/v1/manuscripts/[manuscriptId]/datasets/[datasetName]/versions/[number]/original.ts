import { getOriginal as contract } from "@/lib/contracts/datasets"
import { contentDisposition } from "@/lib/server/http/content-disposition"
import { endpoint } from "@/lib/server/http/endpoint"
import { originalOf } from "@/lib/server/services/datasets/original"

export const GET = endpoint(contract, async ({ db, params }) => {
  const { fileName, size, sha256, stream } = await originalOf(db, params)
  return new Response(stream, {
    headers: {
      "content-type": "application/octet-stream",
      "content-length": String(size),
      "content-disposition": contentDisposition("attachment", fileName),
      etag: `"${sha256}"`,
      "cache-control": "private, no-cache",
    },
  })
})
