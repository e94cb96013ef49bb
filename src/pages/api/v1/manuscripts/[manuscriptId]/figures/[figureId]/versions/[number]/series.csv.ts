import { getSeries as contract } from "@/lib/contracts/figures"
import { contentDisposition } from "@/lib/server/http/content-disposition"
import { endpoint } from "@/lib/server/http/endpoint"
import { seriesAsCsv } from "@/lib/server/services/figures/version-files"

export const GET = endpoint(contract, async ({ db, params, query }) => {
  const { name, csv } = await seriesAsCsv(db, params, query.panel, query.series)
  return new Response(csv, {
    headers: {
      "content-type": "text/csv; charset=utf-8",
      "content-disposition": contentDisposition("attachment", name),
      "cache-control": "private, no-cache",
    },
  })
})
