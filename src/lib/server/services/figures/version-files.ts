import { curvesCsv } from "@/lib/bundle/series-csv"
import { Problem } from "@/lib/contracts/problems"
import type { RenderingFormat } from "@/lib/domain/states"
import type { Db } from "@/lib/server/db/client"
import type { DrawnSeries } from "@specs/figure-kind"
import { getVersionRow } from "./figure-versions"

interface VersionPlace {
  readonly manuscriptId: string
  readonly figureId: string
  readonly number: number
}

/** The bytes of one rendering. @throws Problem `not-found` while it is not drawn */
export async function getRendering(db: Db, place: VersionPlace & { readonly format: RenderingFormat }) {
  const row = await getVersionRow(db, place.manuscriptId, place.figureId, place.number)
  const rendering = await db
    .selectFrom("rendering")
    .select(["bytes", "sha256"])
    .where("figureVersionId", "=", row.id)
    .where("format", "=", place.format)
    .orderBy("dpi", "desc")
    .executeTakeFirst()
  if (!rendering)
    throw new Problem(
      "not-found",
      `The proof of version ${place.number} is not drawn as ${place.format} yet.`,
    )
  return { bytes: rendering.bytes, sha256: rendering.sha256.toString("hex") }
}

/** results.json as it was hashed. @throws Problem `not-found` while it is not computed */
export async function getResultBytes(db: Db, place: VersionPlace) {
  const { document, sha256 } = await getResult(db, place)
  return { bytes: document, sha256: sha256.toString("hex") }
}

async function getResult(db: Db, place: VersionPlace) {
  const row = await getVersionRow(db, place.manuscriptId, place.figureId, place.number)
  const result = await db
    .selectFrom("result")
    .select(["document", "sha256", "series"])
    .where("figureVersionId", "=", row.id)
    .executeTakeFirst()
  if (!result) throw new Problem("not-found", `Version ${place.number} is not computed yet.`)
  return result
}

/**
 * One drawn series of a panel as CSV, all its curves.
 *
 * @param panel counted from 1
 * @param name the panel's first series when it is undefined
 * @throws Problem `not-found`, `invalid-request` naming what there is
 */
export async function seriesAsCsv(db: Db, place: VersionPlace, panel: number, name: string | undefined) {
  const { series } = await getResult(db, place)
  const panels = JSON.parse(series.toString("utf8")) as DrawnSeries[][]
  const all = panels[panel - 1]
  const wrong = (pointer: string, message: string) =>
    new Problem("invalid-request", undefined, [{ pointer, code: "no-such-series", message }])
  if (!all) throw wrong("?panel", `The figure has ${panels.length} panels.`)
  const wanted = name ?? all[0]?.name
  const curves = all.filter((one) => one.name === wanted)
  if (curves.length === 0)
    throw wrong("?series", `The series are ${[...new Set(all.map((one) => one.name))].join(", ")}.`)
  return { name: `panel-${panel}-${wanted}.csv`, csv: curvesCsv(curves) }
}
