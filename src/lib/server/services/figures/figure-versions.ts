import type { z } from "zod"
import type { resultsDocument } from "@/lib/contracts/figures"
import { Problem } from "@/lib/contracts/problems"
import type { RenderingFormat } from "@/lib/domain/states"
import type { Db } from "@/lib/server/db/client"
import { newerVersionExists } from "@/lib/server/services/datasets/newer-version"
import { figureSpec } from "@specs/figure-spec"
import { kindOf } from "@specs/kinds"
import type { FigureSoftware } from "./figure-software"
import { presentVersion, versionsInList } from "./figures"

/** The row of one version. @throws Problem `not-found` */
export async function getVersionRow(db: Db, manuscriptId: string, figureId: string, number: number) {
  const row = await versionsInList(db)
    .where("figure.manuscriptId", "=", manuscriptId)
    .where("v.figureId", "=", figureId)
    .where("v.number", "=", number)
    .executeTakeFirst()
  if (!row) throw new Problem("not-found", "There is no such version of this figure.")
  return row
}

/** One version with spec, inputs, results and renderings. @throws Problem `not-found` */
export async function getFigureVersion(db: Db, manuscriptId: string, figureId: string, number: number) {
  const row = await getVersionRow(db, manuscriptId, figureId, number)
  const { spec: stored } = await db
    .selectFrom("figureVersion")
    .select("spec")
    .where("id", "=", row.id)
    .executeTakeFirstOrThrow()
  const spec = figureSpec.parse(stored)
  const inputs = await db
    .selectFrom("figureVersionInput as i")
    .innerJoin("datasetVersion", "datasetVersion.id", "i.datasetVersionId")
    .innerJoin("blob", "blob.id", "datasetVersion.blobId")
    .select(["i.datasetName as dataset", "datasetVersion.number", "blob.sha256"])
    .select((eb) => newerVersionExists(eb).as("newerExists"))
    .where("i.figureVersionId", "=", row.id)
    .orderBy("i.datasetName")
    .execute()
  const result = await db
    .selectFrom("result")
    .select(["document", "sha256", "software"])
    .where("figureVersionId", "=", row.id)
    .executeTakeFirst()
  const renderings = await db
    .selectFrom("rendering")
    .select(["dpi", "sha256"])
    .select((eb) => [
      eb.ref("format").$castTo<RenderingFormat>().as("format"),
      eb.fn<number>("octet_length", ["bytes"]).as("size"),
    ])
    .where("figureVersionId", "=", row.id)
    .orderBy("format")
    .execute()
  const document = result
    ? (JSON.parse(result.document.toString("utf8")) as z.input<typeof resultsDocument>)
    : null
  const software = result?.software as FigureSoftware | undefined
  return {
    ...presentVersion(row),
    figureId,
    spec,
    inputs: inputs.map((input) => ({ ...input, sha256: input.sha256.toString("hex") })),
    results: document,
    resultsSha256: result?.sha256.toString("hex") ?? null,
    // Before there are results: what the spec alone says.
    sentence:
      software?.sentence ?? spec.panels.map((panel) => kindOf(panel.kind).sentence(panel).plain).join(" "),
    alternativeText: software?.alternativeText ?? null,
    renderings: renderings.map((rendering) => ({ ...rendering, sha256: rendering.sha256.toString("hex") })),
  }
}
