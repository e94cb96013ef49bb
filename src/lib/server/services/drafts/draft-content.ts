import { createHash } from "node:crypto"
import { draftContent } from "@/lib/domain/draft-digest"
import type { Db } from "@/lib/server/db/client"

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
    .where("p.draftId", "=", draftId)
    .execute()
  return pins.map((pin) => ({
    ...pin,
    data: Object.fromEntries(
      inputs
        .filter((input) => input.figureVersionId === pin.figureVersionId)
        .map((input) => [input.datasetName, hex(input.sha256)]),
    ),
  }))
}

type Pinned = Awaited<ReturnType<typeof pinnedFigures>>

/** SHA-256 of what is pinned, or null while nothing is. */
export function digestOf(title: string, pins: Pinned): Buffer | null {
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
