import { getBundle as contract } from "@/lib/contracts/drafts"
import { contentDisposition } from "@/lib/server/http/content-disposition"
import { endpoint } from "@/lib/server/http/endpoint"
import { bundleBytes } from "@/lib/server/services/drafts/bundle-bytes"

export const GET = endpoint(contract, async ({ db, params }) => {
  const { name, sha256, size, stream } = await bundleBytes(db, params)
  return new Response(stream, {
    headers: {
      "content-type": "application/zip",
      "content-length": String(size),
      "content-disposition": contentDisposition("attachment", name),
      etag: `"${sha256}"`,
      "cache-control": "private, no-cache",
    },
  })
})
