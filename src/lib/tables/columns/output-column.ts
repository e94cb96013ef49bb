import type { RecipeColumn } from "../reading-recipe"
import type { ArrayAxis, ColumnKind, ColumnReading } from "../table-reading"
import type { SentinelWatch } from "./sentinel-watch"

export type ColumnSummary = Omit<
  ColumnReading,
  | "index"
  | "name"
  | "unit"
  | "symbol"
  | "kind"
  | "axes"
  | "role"
  | "roleReason"
  | "uncertaintyOf"
  | "longName"
>

/** A column of the result while a file is read, whatever its format. */
export interface OutputColumn {
  readonly name: string
  readonly unit: string | null
  /** TeX that the file gives; else it is made from the name. */
  readonly symbol: string | null
  readonly kind: ColumnKind
  readonly axes: readonly ArrayAxis[] | null
  readonly longName: string | null
  /** Place of the column in the file, from 1, or null for a column that the reader adds. */
  readonly place: number | null
  /** What the recipe says of it. */
  readonly told: Partial<RecipeColumn> | undefined
  summary(): ColumnSummary
  readonly sentinels: SentinelWatch | null
}
