import {
  type BundleContent,
  draftRecord,
  type FigureBytes,
  type RecordedDataset,
} from "@/lib/bundle/draft-record"
import { canonicalJson } from "@/lib/domain/canonical-json"
import type { Db } from "@/lib/server/db/client"
import { readBlob } from "@/lib/server/services/datasets/read-blob"
import { softwareVersion } from "@/lib/bundle/software-version"

/** Everything that the bundle of a locked draft holds: its record, and the bytes that the record speaks of. */
export async function bundleContent(db: Db, draftId: string): Promise<BundleContent> {
  const draft = await db
    .selectFrom("draft")
    .select(["record", "manuscriptId"])
    .where("id", "=", draftId)
    .where("state", "=", "locked")
    .executeTakeFirstOrThrow()
  return {
    record: draftRecord.parse(draft.record),
    software: softwareVersion(),
    figures: await figureBytes(db, draftId),
    original: (dataset) => originalBytes(db, draft.manuscriptId, dataset),
  }
}

async function figureBytes(db: Db, draftId: string): Promise<FigureBytes[]> {
  const pins = await db
    .selectFrom("draftFigure as p")
    .innerJoin("figureVersion as v", "v.id", "p.figureVersionId")
    .innerJoin("result", "result.figureVersionId", "v.id")
    .select(["v.id", "v.spec", "result.document", "result.series"])
    .where("p.draftId", "=", draftId)
    .orderBy("p.position")
    .execute()
  const figures: FigureBytes[] = []
  for (const { id, spec, document, series } of pins) {
    const artwork = await db
      .selectFrom("rendering")
      .select("bytes")
      .where("figureVersionId", "=", id)
      .orderBy("format")
      .orderBy("dpi")
      .execute()
    figures.push({
      spec: new TextEncoder().encode(canonicalJson(spec)),
      results: document,
      series,
      artwork: artwork.map(({ bytes }) => bytes),
    })
  }
  return figures
}

async function* originalBytes(
  db: Db,
  manuscriptId: string,
  { name, number }: RecordedDataset,
): AsyncGenerator<Uint8Array> {
  const { blobId } = await db
    .selectFrom("datasetVersion")
    .innerJoin("dataset", "dataset.id", "datasetVersion.datasetId")
    .select("datasetVersion.blobId")
    .where("dataset.manuscriptId", "=", manuscriptId)
    .where("dataset.name", "=", name)
    .where("datasetVersion.number", "=", number)
    .executeTakeFirstOrThrow()
  yield* readBlob(db, blobId)
}
