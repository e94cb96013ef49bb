import { getValuesTex as contract } from "@/lib/contracts/drafts"
import { contentDisposition } from "@/lib/server/http/content-disposition"
import { endpoint } from "@/lib/server/http/endpoint"
import { draftValuesTex } from "@/lib/server/services/drafts/draft-quantities"

export const GET = endpoint(
  contract,
  async ({ db, params, query }) =>
    new Response(await draftValuesTex(db, params, query.form), {
      headers: {
        "content-type": "application/x-tex; charset=utf-8",
        "content-disposition": contentDisposition("attachment", "values.tex"),
        "cache-control": "no-store",
      },
    }),
)
