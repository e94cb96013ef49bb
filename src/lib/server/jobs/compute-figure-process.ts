import { createHash } from "node:crypto"
import { deriveFigure, type DerivedFigure } from "@/lib/bundle/derive-figure"
import { renderingVersions } from "@/lib/render"
import { closeDb, type Db, getDb, getPool } from "@/lib/server/db/client"
import { loadTable } from "@/lib/server/services/datasets/load-table"
import type { FigureSoftware } from "@/lib/server/services/figures/figure-software"
import { softwareVersion } from "@/lib/bundle/software-version"
import type { DataTable } from "@specs/figure-kind"
import { figureSpec } from "@specs/figure-spec"
import { tellWorker, workOfChild } from "./run-in-child"

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest()

/** Computes and draws one figure version and stores both, in one transaction; a program of its own. */
async function main(): Promise<void> {
  const { figureVersionId } = workOfChild<{ figureVersionId: string }>()
  const db = getDb()
  try {
    const version = await db
      .selectFrom("figureVersion")
      .select("spec")
      .where("id", "=", figureVersionId)
      .executeTakeFirstOrThrow()
    const inputs = await db
      .selectFrom("figureVersionInput")
      .select(["datasetName", "datasetVersionId"])
      .where("figureVersionId", "=", figureVersionId)
      .execute()
    const tables = new Map<string, DataTable>()
    for (const { datasetName, datasetVersionId } of inputs)
      tables.set(datasetName, await loadTable(db, getPool(), datasetVersionId))
    const figure = await deriveFigure(figureSpec.parse(version.spec), tables, (share, what) =>
      tellWorker({ type: "progress", share, what }),
    )
    await db.transaction().execute((trx) => store(trx, figureVersionId, figure))
    tellWorker({ type: "done" })
  } catch (error) {
    // What cannot be computed and labels that cannot be set name their places in the spec.
    if (!(error instanceof Error && "issues" in error)) throw error
    const errors = error.issues as object[]
    tellWorker({ type: "failure", message: "The figure cannot be made as written.", errors })
  } finally {
    await closeDb()
  }
}

async function store(trx: Db, figureVersionId: string, figure: DerivedFigure): Promise<void> {
  const { results, series, sentence, alternativeText, widthMm, heightMm, artwork } = figure
  const software: FigureSoftware = {
    version: softwareVersion(),
    rendering: renderingVersions(),
    alternativeText,
    sentence,
  }
  await trx
    .insertInto("result")
    .values({
      figureVersionId,
      document: Buffer.from(results),
      sha256: sha256(results),
      series: Buffer.from(series),
      software: JSON.stringify(software),
    })
    .execute()
  for (const { format, dpi, bytes } of artwork)
    await trx
      .insertInto("rendering")
      .values({
        figureVersionId,
        format,
        dpi,
        bytes: Buffer.from(bytes),
        sha256: sha256(bytes),
        widthMm,
        heightMm,
      })
      .execute()
  const { numUpdatedRows } = await trx
    .updateTable("computation")
    .set({ state: "done", progress: null, finishedAt: new Date() })
    .where("figureVersionId", "=", figureVersionId)
    .where("state", "=", "computing")
    .executeTakeFirst()
  if (numUpdatedRows === 0n) throw new Error("The computation was cancelled.")
}

await main()
process.disconnect?.()
