import type { IntakeCodeName } from "./intake-codes"
import type { ReadingRecipe, RecipeInput } from "./reading-recipe"

export type TableFormat = "text" | "npy" | "npz" | "hdf5" | "parquet" | "json-lines"

/** boolean is stored as 0 and 1, datetime as the text that the file holds. */
export type ColumnKind = "number" | "text" | "boolean" | "datetime"

export type ColumnRole =
  "trajectory" | "time" | "observable" | "uncertainty" | "parameter" | "coordinate" | "weight"

/** A number that JSON can hold, "NaN", "Infinity" or "-Infinity", text, or null for missing. */
export type CellValue = number | string | null

/** One axis of an array column. */
export interface ArrayAxis {
  /** null until the user has named it. */
  readonly name: string | null
  readonly length: number
  /** Name of the column that holds the positions along the axis. */
  readonly coordinate: string | null
}

/** What is known of a column before its values are read. */
export interface ColumnDescription {
  readonly index: number
  readonly name: string
  /** As the file writes it; "" when the file says that there is none, null when it says nothing. */
  readonly unit: string | null
  /** TeX without dollar signs. */
  readonly symbol: string | null
  readonly kind: ColumnKind
  /** Set for arrays: values are in C order, the last axis fastest. */
  readonly axes: readonly ArrayAxis[] | null
}

/** Counts in bins of equal width from low to high: a sketch for the eye, made while streaming. */
export interface DistributionSketch {
  readonly low: number
  readonly high: number
  readonly counts: readonly number[]
}

/** A column after reading. Sums and ranges are over finite values; null when there are none or for text. */
export interface ColumnReading extends ColumnDescription {
  readonly role: ColumnRole | null
  /** Why the role is proposed, as a sentence. */
  readonly roleReason: string | null
  /** For an uncertainty: the column that it belongs to. */
  readonly uncertaintyOf: string | null
  readonly longName: string | null
  readonly count: number
  readonly sum: number | null
  readonly min: number | null
  readonly max: number | null
  readonly nanCount: number
  readonly infCount: number
  readonly missingCount: number
  readonly firstValues: readonly CellValue[]
  readonly distinctCount: number
  /** true when counting stopped at the cap. */
  readonly distinctCapped: boolean
  readonly sketch: DistributionSketch | null
}

/** A place in the file that needs a look. `line` is a physical line, or the name of a dataset or entry. */
export interface IntakeProblem {
  readonly line: number | string | null
  /** 1-based column of the table. */
  readonly column: number | null
  readonly code: IntakeCodeName
  readonly message: string
  /** The text as the file has it, cut at 200 characters. */
  readonly text?: string
}

export interface IntakeNote {
  readonly code: IntakeCodeName
  readonly message: string
  readonly lines?: readonly number[]
  /** What stands on these lines, for comments after rows. */
  readonly texts?: readonly string[]
}

/** A question without a default. Each choice is a merge patch on the recipe. */
export interface IntakeAsk {
  readonly code: IntakeCodeName
  readonly message: string
  readonly line: number | string | null
  readonly column: number | null
  readonly choices: readonly { readonly label: string; readonly recipe: RecipeInput }[]
}

/** Where each physical line went; `physical` is the sum of the others. */
export interface LineAccount {
  readonly physical: number
  /** Lines of the rows that were kept; a quoted row may span several. */
  readonly rows: number
  readonly setAside: number
  readonly headers: number
  readonly repeatedHeaders: number
  readonly comments: number
  readonly blanks: number
  /** Lines that the recipe skips. */
  readonly skipped: number
}

export interface PreviewRow {
  readonly line: number | null
  readonly cells: readonly string[]
}

export interface MetadataEntry {
  readonly key: string
  readonly value: string
  /** Line of a text file, path in a binary one. */
  readonly place: number | string
  /** Block of the text file that it belongs to. */
  readonly block?: number
}

/** Everything that is known of a file after reading it once. Survives JSON unchanged. */
export interface TableReading {
  readonly format: TableFormat
  readonly recipe: ReadingRecipe
  readonly columns: readonly ColumnReading[]
  /** Rows of the table; for arrays, elements of the largest. */
  readonly rows: number
  readonly lineAccount: LineAccount | null
  readonly preview: { readonly first: readonly PreviewRow[]; readonly last: readonly PreviewRow[] }
  readonly metadata: readonly MetadataEntry[]
  readonly notes: readonly IntakeNote[]
  readonly problems: readonly IntakeProblem[]
  /** Full counts, also of problems beyond the cap of the list. */
  readonly problemCounts: readonly { readonly code: IntakeCodeName; readonly count: number }[]
  readonly asks: readonly IntakeAsk[]
  readonly refused: {
    readonly code: IntakeCodeName
    readonly message: string
    readonly line: number | string | null
    readonly column: number | null
  } | null
}
