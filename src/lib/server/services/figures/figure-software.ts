import type { RenderingVersions } from "@/lib/render"
import type { RecordedSoftware } from "@/lib/bundle/draft-record"

/** What is kept with a result besides its numbers: what made it, and the words that go with it. */
export interface FigureSoftware {
  readonly version: RecordedSoftware
  readonly rendering: RenderingVersions
  readonly alternativeText: string
  /** The statistics part of the caption. */
  readonly sentence: string
}
