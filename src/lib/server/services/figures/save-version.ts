import { createHash } from "node:crypto"
import { Problem } from "@/lib/contracts/problems"
import { canonicalJson } from "@/lib/domain/canonical-json"
import { texNameProblem } from "@/lib/domain/values-tex"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { addJob } from "@/lib/server/db/jobs"
import { datasetsOf } from "@specs/compute-figure"
import { figureSpec, type FigureSpec } from "@specs/figure-spec"
import { issuesOf } from "@specs/read-spec"
import { SpecError, type SpecIssue } from "@specs/spec-error"
import { getFigureVersion } from "./figure-versions"
import { getFigure } from "./figures"

/** A spec that came from outside. @throws SpecError with every issue at its place */
function parseSpec(json: unknown): FigureSpec {
  const parsed = figureSpec.safeParse(json)
  if (!parsed.success) throw new SpecError(issuesOf(parsed.error))
  const issues = macroIssues(parsed.data)
  if (issues.length > 0) throw new SpecError(issues)
  return parsed.data
}

/** Names of quantities that TeX has already: found here rather than when the paper is to be sent. */
function macroIssues({ panels }: FigureSpec): SpecIssue[] {
  return panels.flatMap((panel, at) =>
    panel.quantities.flatMap(({ name }, index) => {
      const message = texNameProblem(name)
      return message ? [{ pointer: `/panels/${at}/quantities/${index}/name`, code: "tex-name", message }] : []
    }),
  )
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
