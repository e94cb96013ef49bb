import type { DraftRecord, RecordedDataset, RecordedFigure } from "@/lib/bundle/draft-record"
import type { Db } from "@/lib/server/db/client"
import type { FigureSoftware } from "@/lib/server/services/figures/figure-software"
import type { ColumnRole } from "@specs/schema/data-binding"

const hex = (bytes: Buffer) => bytes.toString("hex")

/** What is decided at the lock itself. */
export interface LockDecision {
  readonly digest: Buffer
  readonly lockedAt: Date
  readonly lockedBy: string
  readonly lockReason: string | null
}

/** A draft as it is at this moment, to be kept with its lock. */
export async function draftRecord(
  trx: Db,
  draftId: string,
  { digest, lockedAt, lockedBy, lockReason }: LockDecision,
): Promise<DraftRecord> {
  const { number, draftTitle, manuscriptId, ...manuscript } = await trx
    .selectFrom("draft")
    .innerJoin("manuscript", "manuscript.id", "draft.manuscriptId")
    .select(["draft.number", "draft.title as draftTitle", "draft.manuscriptId"])
    .select(["manuscript.title", "manuscript.abstract", "manuscript.profile"])
    .where("draft.id", "=", draftId)
    .executeTakeFirstOrThrow()
  const signOffs = await trx
    .selectFrom("signOff")
    .innerJoin("person", "person.id", "signOff.personId")
    .select(["person.name", "signOff.createdAt"])
    .where("signOff.draftId", "=", draftId)
    .where("signOff.withdrawnAt", "is", null)
    .where("signOff.digest", "=", digest)
    .orderBy("signOff.createdAt")
    .execute()
  const people = await trx
    .selectFrom("membership")
    .innerJoin("person", "person.id", "membership.personId")
    .select(["person.id", "person.name", "person.orcid", "membership.role"])
    .where("membership.manuscriptId", "=", manuscriptId)
    .orderBy("membership.createdAt")
    .orderBy("person.name")
    .execute()
  return {
    format: "afterquench-bundle",
    formatVersion: 1,
    manuscript,
    draft: {
      number,
      title: draftTitle,
      digest: hex(digest),
      lockedAt: lockedAt.toISOString(),
      lockedBy: people.find((person) => person.id === lockedBy)?.name ?? "",
      lockReason,
      signOffs: signOffs.map(({ name, createdAt }) => ({ name, at: createdAt.toISOString() })),
    },
    people: people.map(({ name, role, orcid }) => ({ name, role, orcid })),
    figures: await recordedFigures(trx, draftId),
    datasets: await recordedDatasets(trx, draftId),
  }
}

async function recordedFigures(trx: Db, draftId: string): Promise<RecordedFigure[]> {
  const pins = await trx
    .selectFrom("draftFigure as p")
    .innerJoin("figure", "figure.id", "p.figureId")
    .innerJoin("figureVersion as v", "v.id", "p.figureVersionId")
    .innerJoin("person", "person.id", "v.authorId")
    .innerJoin("result", "result.figureVersionId", "v.id")
    .select(["v.id", "v.number as version", "v.message", "v.createdAt", "v.specSha256", "p.caption"])
    .select(["figure.name", "figure.title", "person.name as author"])
    .select(["result.sha256 as resultsSha256", "result.software"])
    .where("p.draftId", "=", draftId)
    .orderBy("p.position")
    .execute()
  const figures: RecordedFigure[] = []
  for (const { id, createdAt, specSha256, resultsSha256, software: made, ...pin } of pins) {
    const artwork = await trx
      .selectFrom("rendering")
      .select(["format", "dpi"])
      .where("figureVersionId", "=", id)
      .orderBy("format")
      .orderBy("dpi")
      .execute()
    const inputs = await trx
      .selectFrom("figureVersionInput as i")
      .innerJoin("datasetVersion", "datasetVersion.id", "i.datasetVersionId")
      .innerJoin("blob", "blob.id", "datasetVersion.blobId")
      .select(["i.datasetName as dataset", "datasetVersion.number", "blob.sha256"])
      .where("i.figureVersionId", "=", id)
      .orderBy("i.datasetName")
      .execute()
    const { version: software, rendering, sentence, alternativeText } = made as FigureSoftware
    figures.push({
      ...pin,
      savedAt: createdAt.toISOString(),
      specSha256: hex(specSha256),
      resultsSha256: hex(resultsSha256),
      sentence,
      alternativeText,
      inputs: inputs.map((input) => ({ ...input, sha256: hex(input.sha256) })),
      artwork,
      software,
      rendering,
    })
  }
  return figures
}

async function recordedDatasets(trx: Db, draftId: string): Promise<RecordedDataset[]> {
  const versions = await trx
    .selectFrom("draftFigure as p")
    .innerJoin("figureVersionInput as i", "i.figureVersionId", "p.figureVersionId")
    .innerJoin("datasetVersion as v", "v.id", "i.datasetVersionId")
    .innerJoin("dataset", "dataset.id", "v.datasetId")
    .innerJoin("blob", "blob.id", "v.blobId")
    .select(["v.id", "dataset.name", "v.number", "v.fileName", "v.recipe", "blob.sha256", "blob.size"])
    .distinctOn(["dataset.name", "v.number"])
    .where("p.draftId", "=", draftId)
    .orderBy("dataset.name")
    .orderBy("v.number")
    .execute()
  const datasets: RecordedDataset[] = []
  for (const { id, sha256, ...version } of versions) {
    const columns = await trx
      .selectFrom("datasetColumn")
      .select(["columnIndex as index", "name", "unit", "symbol", "kind"])
      .select((eb) => eb.ref("role").$castTo<ColumnRole | null>().as("role"))
      .where("datasetVersionId", "=", id)
      .orderBy("columnIndex")
      .execute()
    datasets.push({ ...version, sha256: hex(sha256), columns })
  }
  return datasets
}
