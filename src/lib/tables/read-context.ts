import type { ColumnSink } from "./column-chunk"
import type { IntakeLimits } from "./intake-limits"
import type { RecipeInput } from "./reading-recipe"
import type { IntakeProblem } from "./table-reading"

export interface ReadingProgress {
  readonly phase: "surveying" | "reading"
  /** Bytes of this phase so far, and in all; unpacked bytes may exceed the size of the file. */
  readonly bytes: number
  readonly totalBytes: number
  readonly rows: number
}

export interface ReadOptions {
  /** Any part of a recipe; what it leaves out is found out. */
  readonly recipe?: RecipeInput | null
  readonly limits?: Partial<IntakeLimits>
  readonly signal?: AbortSignal
  readonly onProgress?: (progress: ReadingProgress) => void
  /** Told of every problem, also of those beyond the cap of the list; start over when `onRestart` is called. */
  readonly onProblem?: (problem: IntakeProblem) => void
  readonly onRestart?: () => void
}

/** What the reader of one format is handed. */
export interface ReadContext extends ReadOptions {
  readonly recipe: RecipeInput
  readonly limits: IntakeLimits
  readonly sink: ColumnSink | null
}
