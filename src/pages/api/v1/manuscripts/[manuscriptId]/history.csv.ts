import { exportHistory as contract } from "@/lib/contracts/events"
import { contentDisposition } from "@/lib/server/http/content-disposition"
import { endpoint } from "@/lib/server/http/endpoint"
import { streamOf } from "@/lib/server/services/datasets/read-blob"
import { historyCsv } from "@/lib/server/services/history/history"

export const GET = endpoint(
  contract,
  ({ db, params }) =>
    new Response(streamOf(historyCsv(db, params.manuscriptId)), {
      headers: {
        "content-type": "text/csv; charset=utf-8",
        "content-disposition": contentDisposition("attachment", "history.csv"),
        "cache-control": "no-store",
      },
    }),
)
