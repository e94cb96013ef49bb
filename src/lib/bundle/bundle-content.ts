import type { ColumnRole } from "@specs/schema/data-binding"

/** A pinned dataset version: its file and how it was read. */
export interface BundledDataset {
  readonly name: string
  readonly number: number
  readonly fileName: string
  readonly sha256: string
  readonly size: number
  readonly recipe: unknown
  /** Columns as they were accepted, in file order. */
  readonly columns: readonly {
    readonly index: number
    readonly name: string
    readonly unit: string | null
    readonly symbol: string | null
    readonly role: ColumnRole | null
    readonly kind: string
  }[]
  /** The uploaded bytes; called once, when they are written. */
  readonly bytes: () => AsyncIterable<Uint8Array>
}

/** A pinned figure version with everything that was computed and drawn from it. */
export interface BundledFigure {
  readonly name: string
  readonly title: string
  readonly caption: string
  readonly version: number
  readonly spec: unknown
  /** results.json, the bytes that were hashed. */
  readonly results: Uint8Array
  /** The drawn series of each panel, canonical JSON. */
  readonly series: Uint8Array
  readonly sentence: string
  readonly alternativeText: string
  readonly artwork: readonly {
    readonly format: string
    readonly dpi: number | null
    readonly bytes: Uint8Array
  }[]
  readonly inputs: readonly { readonly dataset: string; readonly number: number; readonly sha256: string }[]
  readonly software: unknown
}

/** Everything that goes into the bundle of a locked draft. */
export interface BundleContent {
  readonly manuscript: { readonly title: string; readonly abstract: string; readonly profile: string }
  readonly draft: {
    readonly number: number
    readonly title: string
    readonly digest: string
    readonly lockedAt: string
    readonly lockedBy: string
    readonly lockReason: string | null
    readonly signOffs: readonly { readonly name: string; readonly at: string }[]
  }
  readonly people: readonly { readonly name: string; readonly role: string; readonly orcid: string | null }[]
  readonly figures: readonly BundledFigure[]
  readonly datasets: readonly BundledDataset[]
  readonly software: { readonly name: string; readonly version: string; readonly lockfileSha256: string }
}
