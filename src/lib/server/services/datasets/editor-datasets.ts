import type { Db } from "@/lib/server/db/client"

/** Distinct values of a column that a filter offers. */
const offered = 12

/** The newest accepted version of each dataset with its columns, as the figure editor offers them. */
export async function editorDatasets(db: Db, manuscriptId: string) {
  const versions = await db
    .selectFrom("datasetVersion as v")
    .innerJoin("dataset", "dataset.id", "v.datasetId")
    .select(["v.id", "v.number", "dataset.name"])
    .distinctOn("dataset.name")
    .where("dataset.manuscriptId", "=", manuscriptId)
    .where("v.state", "=", "accepted")
    .orderBy("dataset.name")
    .orderBy("v.number", "desc")
    .execute()
  return Promise.all(
    versions.map(async ({ id, number, name }) => {
      const columns = await db
        .selectFrom("datasetColumn")
        .select(["columnIndex", "name", "unit", "role", "statistics"])
        .where("datasetVersionId", "=", id)
        .orderBy("columnIndex")
        .execute()
      return {
        name,
        number,
        columns: columns.map((column) => {
          const { distinct = [] } = (column.statistics ?? {}) as { distinct?: (number | string)[] }
          return {
            name: column.name,
            unit: column.unit,
            role: column.role,
            values: distinct.slice(0, offered),
          }
        }),
      }
    }),
  )
}
