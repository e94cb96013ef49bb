import { Readable } from "node:stream"
import type { ReadableStream as NodeStream } from "node:stream/web"
import { postDatasetVersion, pushDatasetVersion } from "@/lib/contracts/datasets"
import { Problem } from "@/lib/contracts/problems"
import { endpoint, type Call } from "@/lib/server/http/endpoint"
import { reply } from "@/lib/server/http/reply"
import { announcedFileName, announcedSha256, plainFileName } from "@/lib/server/http/upload-headers"
import { uploadDatasetVersion } from "@/lib/server/services/datasets/upload"

type Upload = Call<
  typeof pushDatasetVersion.params,
  typeof pushDatasetVersion.query,
  "stream",
  typeof pushDatasetVersion.access
>

async function receive({ db, actor, params, query, body, request: { headers } }: Upload) {
  if (!body)
    throw new Problem("invalid-request", "The request has no body: send the file itself, as curl -T does.")
  const length = headers.get("content-length")
  const asked = query.fileName === undefined ? undefined : plainFileName(query.fileName)
  const { version, isNew } = await uploadDatasetVersion(db, {
    ...params,
    fileName: asked ?? announcedFileName(headers) ?? params.datasetName,
    personId: actor.person.id,
    pieces: Readable.fromWeb(body as NodeStream),
    announced: length === null ? null : Number(length),
    sha256: announcedSha256(headers),
  })
  return reply(version, { status: isNew ? 201 : 200 })
}

export const PUT = endpoint(pushDatasetVersion, receive)
export const POST = endpoint(postDatasetVersion, receive)
