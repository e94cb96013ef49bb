import { getArtwork as contract } from "@/lib/contracts/figures"
import type { RenderingFormat } from "@/lib/domain/states"
import { bytesResponse } from "@/lib/server/http/bytes-response"
import { endpoint } from "@/lib/server/http/endpoint"
import { getRendering } from "@/lib/server/services/figures/version-files"
import { getFigure } from "@/lib/server/services/figures/figures"

const types: Record<RenderingFormat, string> = {
  svg: "image/svg+xml",
  png: "image/png",
  pdf: "application/pdf",
  eps: "application/postscript",
  tiff: "image/tiff",
}

export const GET = endpoint(contract, async ({ db, params, query, request }) => {
  const { name } = await getFigure(db, params.manuscriptId, params.figureId)
  const { bytes, sha256 } = await getRendering(db, params)
  return bytesResponse(request, bytes, {
    type: types[params.format],
    sha256,
    fileName: `${name}-v${params.number}.${params.format}`,
    download: query.download === "1",
  })
})
