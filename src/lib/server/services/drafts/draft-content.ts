import { createHash } from "node:crypto"
import { draftContent } from "@/lib/domain/draft-digest"
import type { Db } from "@/lib/server/db/client"
import { newerVersionExists } from "@/lib/server/services/datasets/newer-version"
import type { ResultsDocument } from "@specs/results-document"

const hex = (bytes: Buffer) => bytes.toString("hex")

/** What a draft pins, in order, with all that its digest covers. */
export async function pinnedFigures(db: Db, draftId: string) {
  const pins = await db
    .selectFrom("draftFigure as p")
    .innerJoin("figure", "figure.id", "p.figureId")
    .innerJoin("figureVersion as v", "v.id", "p.figureVersionId")
    .leftJoin("result", "result.figureVersionId", "v.id")
    .select([
      "p.position",
      "p.figureId",
      "p.caption",
      "p.figureVersionId",
      "figure.name as figureName",
      "figure.title as figureTitle",
      "v.number as version",
      "v.specSha256",
      "result.sha256 as resultsSha256",
      "result.document",
    ])
    .select((eb) =>
      eb
        .selectFrom("figureVersion as newest")
        .select((max) => max.fn.max("newest.number").as("n"))
        .whereRef("newest.figureId", "=", "p.figureId")
        .$asScalar()
        .$notNull()
        .as("newest"),
    )
    .where("p.draftId", "=", draftId)
    .orderBy("p.position")
    .execute()
  const inputs = await db
    .selectFrom("figureVersionInput as i")
    .innerJoin("datasetVersion", "datasetVersion.id", "i.datasetVersionId")
    .innerJoin("blob", "blob.id", "datasetVersion.blobId")
    .innerJoin("draftFigure as p", "p.figureVersionId", "i.figureVersionId")
    .select(["i.figureVersionId", "i.datasetName", "blob.sha256"])
    .select((eb) => newerVersionExists(eb).as("isStale"))
    .where("p.draftId", "=", draftId)
    .execute()
  return pins.map(({ document, ...pin }) => {
    const own = inputs.filter((input) => input.figureVersionId === pin.figureVersionId)
    return {
      ...pin,
      results: document && (JSON.parse(document.toString("utf8")) as ResultsDocument),
      data: Object.fromEntries(own.map((input) => [input.datasetName, hex(input.sha256)])),
      staleData: own.filter((input) => input.isStale).map((input) => input.datasetName),
    }
  })
}

export type Pinned = Awaited<ReturnType<typeof pinnedFigures>>[number]

/** SHA-256 of what is pinned, or null while nothing is. */
export function digestOf(title: string, pins: readonly Pinned[]): Buffer | null {
  if (pins.length === 0) return null
  const content = draftContent(
    title,
    pins.map((pin) => ({
      figure: pin.figureName,
      caption: pin.caption,
      specSha256: hex(pin.specSha256),
      resultsSha256: pin.resultsSha256 && hex(pin.resultsSha256),
      data: pin.data,
    })),
  )
  return createHash("sha256").update(content).digest()
}
