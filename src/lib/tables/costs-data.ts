import type { IntakeCodeName } from "./intake-codes"

/** What costs a value or a row; other problems of a reading are told and lose nothing. */
const losses: ReadonlySet<IntakeCodeName> = new Set<IntakeCodeName>([
  "not-a-number",
  "overflow-stars",
  "thousands-separator",
  "overflow",
  "underflow",
  "decimal-precision",
  "ragged-short",
  "ragged-long",
  "quote-stray",
  "comment-midfile",
  "json-line",
  "npy-truncated",
])

/** Whether accepting a table with this problem leaves something of the file out. */
export const costsData = (code: IntakeCodeName): boolean => losses.has(code)
