import { createHash } from "node:crypto"
import type { z } from "zod"
import type { resultsDocument } from "@/lib/contracts/figures"
import { Problem } from "@/lib/contracts/problems"
import { canonicalJson } from "@/lib/domain/canonical-json"
import type { RenderingFormat } from "@/lib/domain/states"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { addJob } from "@/lib/server/db/jobs"
import { datasetsOf } from "@specs/compute-figure"
import { figureSpec, type FigureSpec } from "@specs/figure-spec"
import { kindOf } from "@specs/kinds"
import { issuesOf } from "@specs/read-spec"
import { SpecError } from "@specs/spec-error"
import { getFigure, presentVersion, versionsInList } from "./figures"

/** Parses a spec that came from outside. @throws SpecError with every issue at its place */
export function parseSpec(json: unknown): FigureSpec {
  const parsed = figureSpec.safeParse(json)
  if (parsed.success) return parsed.data
  throw new SpecError(issuesOf(parsed.error))
}

async function pinInputs(
  db: Db,
  manuscriptId: string,
  spec: FigureSpec,
  pins: Readonly<Record<string, number>>,
) {
  const names = datasetsOf(spec)
  const accepted = await db
    .selectFrom("datasetVersion as v")
    .innerJoin("dataset", "dataset.id", "v.datasetId")
    .select(["v.id", "v.number", "dataset.name"])
    .where("dataset.manuscriptId", "=", manuscriptId)
    .where("v.state", "=", "accepted")
    .orderBy("v.number", "desc")
    .execute()
  const pinned = names.map((name) => ({
    name,
    row: accepted.find((row) => row.name === name && (pins[name] === undefined || row.number === pins[name])),
  }))
  const missing = pinned.filter(({ row }) => !row)
  if (missing.length > 0)
    throw new SpecError(
      missing.map(({ name }) => ({
        pointer: `/panels/${spec.panels.findIndex((panel) => panel.data.dataset === name)}/data/dataset`,
        code: "dataset-unknown",
        message:
          pins[name] === undefined
            ? `There is no accepted version of a dataset “${name}”. Upload it, or accept its version.`
            : `Dataset “${name}” has no accepted version ${pins[name]}.`,
      })),
    )
  return pinned.map(({ name, row }) => ({ datasetName: name, datasetVersionId: row!.id }))
}

/**
 * Saves a spec as the next version and puts its computation in the queue, in one transaction.
 *
 * @throws SpecError, Problem `not-found`
 */
export async function saveFigureVersion(
  db: Db,
  place: { manuscriptId: string; figureId: string },
  personId: string,
  save: { spec: unknown; message: string; basedOn?: number | null | undefined; pins: Record<string, number> },
) {
  const figure = await getFigure(db, place.manuscriptId, place.figureId)
  const spec = parseSpec(save.spec)
  const inputs = await pinInputs(db, place.manuscriptId, spec, save.pins)
  const text = canonicalJson(spec)
  const number = await db.transaction().execute(async (trx) => {
    await trx.selectFrom("figure").select("id").where("id", "=", place.figureId).forNoKeyUpdate().execute()
    const versions = await trx
      .selectFrom("figureVersion")
      .select(["id", "number"])
      .where("figureId", "=", place.figureId)
      .orderBy("number", "desc")
      .execute()
    const base =
      save.basedOn === undefined ? versions[0] : versions.find((version) => version.number === save.basedOn)
    if (save.basedOn && !base) throw new Problem("not-found", `This figure has no version ${save.basedOn}.`)
    const next = (versions[0]?.number ?? 0) + 1
    const { id } = await trx
      .insertInto("figureVersion")
      .values({
        figureId: place.figureId,
        number: next,
        spec: text,
        specSha256: createHash("sha256").update(text).digest(),
        message: save.message,
        authorId: personId,
        basedOn: base?.id ?? null,
      })
      .returning("id")
      .executeTakeFirstOrThrow()
    await trx
      .insertInto("figureVersionInput")
      .values(inputs.map((input) => ({ ...input, figureVersionId: id })))
      .execute()
    await trx.insertInto("computation").values({ figureVersionId: id }).execute()
    await addJob(trx, "compute-figure", { figureVersionId: id }, { maxAttempts: 2 })
    await insertEvent(trx, {
      manuscriptId: place.manuscriptId,
      personId,
      kind: "figure-version.saved",
      subject: id,
      data: { figure: figure.name, figureId: figure.id, number: next, message: save.message },
    })
    return next
  })
  return getFigureVersion(db, place.manuscriptId, place.figureId, number)
}

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
    .innerJoin("datasetVersion as v", "v.id", "i.datasetVersionId")
    .innerJoin("blob", "blob.id", "v.blobId")
    .select(["i.datasetName as dataset", "v.number", "blob.sha256"])
    .select((eb) =>
      eb
        .exists(
          eb
            .selectFrom("datasetVersion as newer")
            .select("newer.id")
            .whereRef("newer.datasetId", "=", "v.datasetId")
            .whereRef("newer.number", ">", "v.number")
            .where("newer.state", "=", "accepted"),
        )
        .$castTo<boolean>()
        .as("newerExists"),
    )
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
  const software = result?.software as { sentences?: string[]; alternativeText?: string } | undefined
  return {
    ...presentVersion(row),
    figureId,
    spec,
    inputs: inputs.map((input) => ({ ...input, sha256: input.sha256.toString("hex") })),
    results: document,
    resultsSha256: result?.sha256.toString("hex") ?? null,
    sentence: (
      software?.sentences ?? spec.panels.map((panel) => kindOf(panel.kind).sentence(panel).plain)
    ).join(" "),
    alternativeText: software?.alternativeText ?? null,
    renderings: renderings.map((rendering) => ({ ...rendering, sha256: rendering.sha256.toString("hex") })),
  }
}

/** The bytes of one rendering. @throws Problem `not-found` while it is not drawn */
export async function getRendering(
  db: Db,
  place: { manuscriptId: string; figureId: string; number: number; format: RenderingFormat },
) {
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
export async function getResultBytes(
  db: Db,
  place: { manuscriptId: string; figureId: string; number: number },
) {
  const row = await getVersionRow(db, place.manuscriptId, place.figureId, place.number)
  const result = await db
    .selectFrom("result")
    .select(["document", "sha256"])
    .where("figureVersionId", "=", row.id)
    .executeTakeFirst()
  if (!result) throw new Problem("not-found", `Version ${place.number} is not computed yet.`)
  return { bytes: result.document, sha256: result.sha256.toString("hex") }
}
