import type { ThousandsMark } from "../numbers/read-cell"
import type { Delimiter, SegmentMark } from "../reading-recipe"
import type { FieldKind } from "./column-evidence"

/** One field of a row: what its cells are and what its column is called. */
export interface FieldPlan {
  readonly name: string
  readonly unit: string | null
  readonly kind: FieldKind
  /** The recipe says the kind; the file may not change it. */
  readonly kindTold: boolean
  readonly thousands: ThousandsMark | null
  readonly sentinels: readonly number[] | null
}

/** Every decision that reading the rows of a text needs. */
export interface TextPlan {
  readonly delimiter: Delimiter
  readonly decimal: "." | ","
  readonly prefixes: readonly string[]
  /** `top`: below the data a prefix line with the columns of a row is a row. */
  readonly comments: "anywhere" | "top"
  readonly trailingDelimiter: boolean
  readonly fields: readonly FieldPlan[]
  readonly headerLines: readonly number[]
  /** The header without prefix and with single blanks, to know it again. */
  readonly headerText: string | null
  readonly skipLines: readonly (readonly [number, number])[]
  readonly padShortRows: boolean
  readonly segments: { readonly by: SegmentMark; readonly column: string } | null
  readonly block: number | null
}

/** Columns that a plan gives: the segment number, and one or two of each field. */
export const plannedColumns = (plan: TextPlan): number =>
  plan.fields.reduce((sum, { kind }) => sum + (kind === "complex" ? 2 : 1), plan.segments ? 1 : 0)
