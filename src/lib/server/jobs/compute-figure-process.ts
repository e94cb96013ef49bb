import { createHash } from "node:crypto"
import { canonicalJson } from "@/lib/domain/canonical-json"
import { renderFigure, renderingVersions, svgToPdf, svgToPng } from "@/lib/render"
import { closeDb, getDb } from "@/lib/server/db/client"
import { loadTable } from "@/lib/server/services/datasets/load-columns"
import { softwareVersion } from "@/lib/server/software-version"
import { computeFigure } from "@specs/compute-figure"
import { figureSpec } from "@specs/figure-spec"
import type { DataTable } from "@specs/figure-kind"
import { kindOf } from "@specs/kinds"
import { resultsDocument } from "@specs/results-document"
import { SpecError } from "@specs/spec-error"
import { tellWorker, workOfChild } from "./run-in-child"

/** Pixels an inch of the PNG proof. */
const proofDpi = 300

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest()

/** Computes and draws one figure version and stores both, in one transaction; a program of its own. */
async function main(): Promise<void> {
  const { figureVersionId } = workOfChild<{ figureVersionId: string }>()
  const db = getDb()
  try {
    const { spec: stored } = await db
      .selectFrom("figureVersion")
      .select("spec")
      .where("id", "=", figureVersionId)
      .executeTakeFirstOrThrow()
    const spec = figureSpec.parse(stored)
    const inputs = await db
      .selectFrom("figureVersionInput")
      .select(["datasetName", "datasetVersionId"])
      .where("figureVersionId", "=", figureVersionId)
      .execute()
    const tables = new Map<string, DataTable>()
    for (const input of inputs) tables.set(input.datasetName, await loadTable(db, input.datasetVersionId))
    const results = computeFigure(spec, { tables }, (share) =>
      tellWorker({ type: "progress", share: 0.7 * share, what: "Computing" }),
    )
    tellWorker({ type: "progress", share: 0.7, what: "Drawing" })
    const figure = await renderFigure(spec, results.panels)
    const drawings = [
      { format: "svg" as const, dpi: null, bytes: Buffer.from(figure.svg) },
      {
        format: "png" as const,
        dpi: proofDpi,
        bytes: Buffer.from(await svgToPng(figure.svg, { dpi: proofDpi })),
      },
      {
        format: "pdf" as const,
        dpi: null,
        bytes: Buffer.from(await svgToPdf(figure.svg, { title: spec.title })),
      },
    ]
    const document = Buffer.from(canonicalJson(resultsDocument(results)))
    const series = Buffer.from(canonicalJson(results.panels.map((panel) => panel.series)))
    const software = {
      version: softwareVersion(),
      rendering: renderingVersions(),
      alternativeText: figure.alternativeText,
      sentences: spec.panels.map(
        (panel, index) => kindOf(panel.kind).sentence(panel, results.panels[index]).plain,
      ),
    }
    await db.transaction().execute(async (trx) => {
      await trx
        .insertInto("result")
        .values({
          figureVersionId,
          document,
          sha256: sha256(document),
          series,
          software: JSON.stringify(software),
        })
        .execute()
      for (const { format, dpi, bytes } of drawings)
        await trx
          .insertInto("rendering")
          .values({
            figureVersionId,
            format,
            dpi,
            bytes,
            sha256: sha256(bytes),
            widthMm: figure.widthMm,
            heightMm: figure.heightMm,
          })
          .execute()
      await trx
        .updateTable("computation")
        .set({ state: "done", progress: null, finishedAt: new Date() })
        .where("figureVersionId", "=", figureVersionId)
        .execute()
    })
    tellWorker({ type: "done" })
  } catch (error) {
    const issues = error instanceof SpecError ? error.issues : undefined
    // A label that cannot be set carries its places like a spec that cannot be computed.
    const labelIssues = error instanceof Error && "issues" in error ? (error.issues as object[]) : undefined
    if (!issues && !labelIssues) throw error
    tellWorker({
      type: "failure",
      message: "The figure cannot be made as written.",
      errors: issues ?? labelIssues ?? [],
    })
  } finally {
    await closeDb()
  }
}

await main()
process.disconnect?.()
