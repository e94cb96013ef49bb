import type { BundleContent } from "@/lib/bundle/bundle-content"
import type { Db } from "@/lib/server/db/client"
import { readBlob } from "@/lib/server/services/datasets/read-blob"
import { softwareVersion } from "@/lib/server/software-version"
import type { ColumnRole } from "@specs/schema/data-binding"

const hex = (bytes: Buffer) => bytes.toString("hex")

/** Everything that the bundle of a locked draft holds. */
export async function bundleContent(db: Db, draftId: string): Promise<BundleContent> {
  const draft = await db
    .selectFrom("draft")
    .innerJoin("manuscript", "manuscript.id", "draft.manuscriptId")
    .innerJoin("person", "person.id", "draft.lockedBy")
    .select([
      "draft.number",
      "draft.title as draftTitle",
      "draft.digest",
      "draft.lockedAt",
      "draft.lockReason",
      "draft.manuscriptId",
      "manuscript.title",
      "manuscript.abstract",
      "manuscript.profile",
      "person.name as lockedBy",
    ])
    .where("draft.id", "=", draftId)
    .where("draft.state", "=", "locked")
    .executeTakeFirstOrThrow()
  const signOffs = await db
    .selectFrom("signOff")
    .innerJoin("person", "person.id", "signOff.personId")
    .select(["person.name", "signOff.createdAt"])
    .where("signOff.draftId", "=", draftId)
    .where("signOff.withdrawnAt", "is", null)
    .where("signOff.digest", "=", draft.digest!)
    .orderBy("signOff.createdAt")
    .execute()
  const people = await db
    .selectFrom("membership")
    .innerJoin("person", "person.id", "membership.personId")
    .select(["person.name", "person.orcid", "membership.role"])
    .where("membership.manuscriptId", "=", draft.manuscriptId)
    .orderBy("membership.createdAt")
    .orderBy("person.name")
    .execute()
  const { title, abstract, profile } = draft
  return {
    manuscript: { title, abstract, profile },
    draft: {
      number: draft.number,
      title: draft.draftTitle,
      digest: hex(draft.digest!),
      lockedAt: draft.lockedAt!.toISOString(),
      lockedBy: draft.lockedBy,
      lockReason: draft.lockReason,
      signOffs: signOffs.map((signOff) => ({ name: signOff.name, at: signOff.createdAt.toISOString() })),
    },
    people,
    figures: await figuresOf(db, draftId),
    datasets: await datasetsOf(db, draftId),
    software: softwareVersion(),
  }
}

async function figuresOf(db: Db, draftId: string): Promise<BundleContent["figures"]> {
  const pins = await db
    .selectFrom("draftFigure as p")
    .innerJoin("figure", "figure.id", "p.figureId")
    .innerJoin("figureVersion as v", "v.id", "p.figureVersionId")
    .innerJoin("result", "result.figureVersionId", "v.id")
    .select([
      "v.id",
      "v.number as version",
      "v.spec",
      "figure.name",
      "figure.title",
      "p.caption",
      "result.document",
      "result.series",
      "result.software",
    ])
    .where("p.draftId", "=", draftId)
    .orderBy("p.position")
    .execute()
  return Promise.all(
    pins.map(async (pin) => {
      const artwork = await db
        .selectFrom("rendering")
        .select(["format", "dpi", "bytes"])
        .where("figureVersionId", "=", pin.id)
        .orderBy("format")
        .execute()
      const inputs = await db
        .selectFrom("figureVersionInput as i")
        .innerJoin("datasetVersion", "datasetVersion.id", "i.datasetVersionId")
        .innerJoin("blob", "blob.id", "datasetVersion.blobId")
        .select(["i.datasetName as dataset", "datasetVersion.number", "blob.sha256"])
        .where("i.figureVersionId", "=", pin.id)
        .orderBy("i.datasetName")
        .execute()
      const { alternativeText, sentences, ...software } = pin.software as {
        alternativeText: string
        sentences: string[]
      }
      return {
        name: pin.name,
        title: pin.title,
        caption: pin.caption,
        version: pin.version,
        spec: pin.spec,
        results: pin.document,
        series: pin.series,
        sentence: sentences.join(" "),
        alternativeText,
        artwork,
        inputs: inputs.map((input) => ({ ...input, sha256: hex(input.sha256) })),
        software,
      }
    }),
  )
}

async function datasetsOf(db: Db, draftId: string): Promise<BundleContent["datasets"]> {
  const versions = await db
    .selectFrom("draftFigure as p")
    .innerJoin("figureVersionInput as i", "i.figureVersionId", "p.figureVersionId")
    .innerJoin("datasetVersion as v", "v.id", "i.datasetVersionId")
    .innerJoin("dataset", "dataset.id", "v.datasetId")
    .innerJoin("blob", "blob.id", "v.blobId")
    .select([
      "v.id",
      "v.number",
      "v.fileName",
      "v.recipe",
      "v.blobId",
      "dataset.name",
      "blob.sha256",
      "blob.size",
    ])
    .distinctOn(["dataset.name", "v.number"])
    .where("p.draftId", "=", draftId)
    .orderBy("dataset.name")
    .orderBy("v.number")
    .execute()
  return Promise.all(
    versions.map(async ({ id, blobId, sha256, ...version }) => {
      const columns = await db
        .selectFrom("datasetColumn")
        .select(["columnIndex as index", "name", "unit", "symbol", "kind"])
        .select((eb) => eb.ref("role").$castTo<ColumnRole | null>().as("role"))
        .where("datasetVersionId", "=", id)
        .orderBy("columnIndex")
        .execute()
      return { ...version, sha256: hex(sha256), columns, bytes: () => readBlob(db, blobId) }
    }),
  )
}
