import { z } from "zod"
import { renderingFormats } from "@/lib/domain/states"
import { columnRole } from "@specs/schema/data-binding"

/** SHA-256 in hexadecimal. */
const sha256 = z.string().regex(/^[0-9a-f]{64}$/)

/** The program and its packages that made something; `lockfileSha256` is that of package-lock.json. */
const recordedSoftware = z.object({
  name: z.string(),
  version: z.string(),
  lockfileSha256: sha256,
  node: z.string(),
  zlib: z.string(),
})
export type RecordedSoftware = z.output<typeof recordedSoftware>

/** A pinned dataset version: its file and how it was read, its columns as they were accepted, in file order. */
const recordedDataset = z.object({
  name: z.string(),
  number: z.int(),
  fileName: z.string(),
  sha256,
  size: z.int(),
  recipe: z.unknown(),
  columns: z.array(
    z.object({
      index: z.int(),
      name: z.string(),
      unit: z.string().nullable(),
      symbol: z.string().nullable(),
      role: columnRole.nullable(),
      kind: z.string(),
    }),
  ),
})
export type RecordedDataset = z.output<typeof recordedDataset>

/** A pinned figure version; `sentence` is the statistics part of its caption, `software` what computed and drew it. */
const recordedFigure = z.object({
  name: z.string(),
  title: z.string(),
  caption: z.string(),
  version: z.int(),
  message: z.string(),
  author: z.string(),
  savedAt: z.string(),
  specSha256: sha256,
  resultsSha256: sha256,
  sentence: z.string(),
  alternativeText: z.string(),
  inputs: z.array(z.object({ dataset: z.string(), number: z.int(), sha256 })),
  artwork: z.array(z.object({ format: z.enum(renderingFormats), dpi: z.int().nullable() })),
  software: recordedSoftware,
  rendering: z.unknown(),
})
export type RecordedFigure = z.output<typeof recordedFigure>

/** A locked draft as it was: everything but the bytes. Kept in the draft's row, and as draft.json in its bundle. */
export const draftRecord = z.object({
  format: z.literal("afterquench-bundle"),
  formatVersion: z.literal(1),
  manuscript: z.object({ title: z.string(), abstract: z.string(), profile: z.string() }),
  draft: z.object({
    number: z.int(),
    title: z.string(),
    digest: sha256,
    lockedAt: z.string(),
    lockedBy: z.string(),
    lockReason: z.string().nullable(),
    signOffs: z.array(z.object({ name: z.string(), at: z.string() })),
  }),
  people: z.array(z.object({ name: z.string(), role: z.string(), orcid: z.string().nullable() })),
  /** In their order in the paper. */
  figures: z.array(recordedFigure),
  datasets: z.array(recordedDataset),
})
export type DraftRecord = z.output<typeof draftRecord>

/** draft.json of a bundle: the record, and what made the bundle. */
export const bundleRecord = draftRecord.extend({ software: recordedSoftware })
export type RecordOfBundle = z.output<typeof bundleRecord>

/** The bytes of a recorded figure. */
export interface FigureBytes {
  readonly spec: Uint8Array
  readonly results: Uint8Array
  readonly series: Uint8Array
  /** In the order of the record's artwork. */
  readonly artwork: readonly Uint8Array[]
}

/** Everything that goes into the bundle of a locked draft. */
export interface BundleContent {
  readonly record: DraftRecord
  /** What makes the bundle. */
  readonly software: RecordedSoftware
  /** In the order of the record's figures. */
  readonly figures: readonly FigureBytes[]
  /** The uploaded bytes of a dataset version; asked for when they are written. */
  readonly original: (dataset: RecordedDataset) => AsyncIterable<Uint8Array>
}
