import { Problem } from "@/lib/contracts/problems"
import type { DatasetVersionState } from "@/lib/domain/states"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import type { ColumnRole } from "@specs/schema/data-binding"

/** Where a version is found. */
export interface DatasetVersionPlace {
  readonly manuscriptId: string
  readonly datasetName: string
  readonly number: number
}

/** Versions with what a list of them shows. */
export function versionsInList(db: Db) {
  return db
    .selectFrom("datasetVersion as v")
    .innerJoin("dataset", "dataset.id", "v.datasetId")
    .innerJoin("blob", "blob.id", "v.blobId")
    .innerJoin("person", "person.id", "v.uploadedBy")
    .select([
      "v.id",
      "v.number",
      "v.fileName",
      "v.format",
      "v.rows",
      "v.uploadedAt",
      "v.acceptedAt",
      "v.datasetId",
      "dataset.name as datasetName",
      "dataset.manuscriptId",
      "blob.sha256",
      "blob.size",
      "person.id as personId",
      "person.name as personName",
    ])
    .select((eb) => eb.ref("v.state").$castTo<DatasetVersionState>().as("state"))
}

type VersionRow = Awaited<ReturnType<ReturnType<typeof versionsInList>["executeTakeFirstOrThrow"]>>

export const presentVersion = ({
  personId,
  personName,
  sha256,
  manuscriptId: _,
  datasetId: __,
  ...row
}: VersionRow) => ({
  ...row,
  sha256: sha256.toString("hex"),
  uploadedBy: { id: personId, name: personName },
})

/** The datasets of a manuscript by name, versions newest first. */
export async function listDatasets(db: Db, manuscriptId: string) {
  const datasets = await db
    .selectFrom("dataset")
    .select(["id", "name", "description"])
    .where("manuscriptId", "=", manuscriptId)
    .orderBy("name")
    .execute()
  const versions = await versionsInList(db)
    .where("dataset.manuscriptId", "=", manuscriptId)
    .orderBy("v.number", "desc")
    .execute()
  return datasets.map((dataset) => ({
    ...dataset,
    versions: versions.filter((version) => version.datasetId === dataset.id).map(presentVersion),
  }))
}

/** One dataset. @throws Problem `not-found` */
export async function getDataset(db: Db, manuscriptId: string, name: string) {
  const found = (await listDatasets(db, manuscriptId)).find((dataset) => dataset.name === name)
  if (!found) throw new Problem("not-found", `There is no dataset “${name}” in this manuscript.`)
  return found
}

/** Names a dataset before its first file. @throws Problem `name-taken` */
export async function createDataset(
  db: Db,
  manuscriptId: string,
  personId: string,
  dataset: { name: string; description: string },
) {
  await db.transaction().execute(async (trx) => {
    const { id } = await trx
      .insertInto("dataset")
      .values({ ...dataset, manuscriptId, createdBy: personId })
      .returning("id")
      .executeTakeFirstOrThrow()
    await insertEvent(trx, {
      manuscriptId,
      personId,
      kind: "dataset.created",
      subject: id,
      data: { dataset: dataset.name },
    })
  })
  return getDataset(db, manuscriptId, dataset.name)
}

/** Changes what is said about a dataset. @throws Problem `not-found` */
export async function changeDataset(
  db: Db,
  manuscriptId: string,
  personId: string,
  name: string,
  description: string,
) {
  const { id } = await getDataset(db, manuscriptId, name)
  await db.transaction().execute(async (trx) => {
    await trx.updateTable("dataset").set({ description }).where("id", "=", id).execute()
    await insertEvent(trx, {
      manuscriptId,
      personId,
      kind: "dataset.changed",
      subject: id,
      data: { dataset: name },
    })
  })
  return getDataset(db, manuscriptId, name)
}

/** The row of one version. @throws Problem `not-found` */
export async function getVersionRow(
  db: Db,
  manuscriptId: string,
  name: string,
  number: number,
): Promise<VersionRow> {
  const row = await versionsInList(db)
    .where("dataset.manuscriptId", "=", manuscriptId)
    .where("dataset.name", "=", name)
    .where("v.number", "=", number)
    .executeTakeFirst()
  if (!row) throw new Problem("not-found", `Dataset “${name}” has no version ${number}.`)
  return row
}

/** One version with its columns and how it was read. @throws Problem `not-found` */
export async function getDatasetVersion(db: Db, manuscriptId: string, name: string, number: number) {
  const row = await getVersionRow(db, manuscriptId, name, number)
  const { reading, recipe, failure } = await db
    .selectFrom("datasetVersion")
    .select(["reading", "recipe", "failure"])
    .where("id", "=", row.id)
    .executeTakeFirstOrThrow()
  const columns = await db
    .selectFrom("datasetColumn")
    .select(["columnIndex as index", "name", "unit", "symbol", "statistics"])
    .select((eb) => [
      eb.ref("role").$castTo<ColumnRole | null>().as("role"),
      eb.ref("kind").$castTo<"number" | "text">().as("kind"),
    ])
    .where("datasetVersionId", "=", row.id)
    .orderBy("columnIndex")
    .execute()
  return { ...presentVersion(row), columns, reading, recipe, failure: failure as { message: string } | null }
}
