/** Bounds of what is read; docs/intake.md says why each. A caller may lower them. */
export interface IntakeLimits {
  /** Bytes of the file, and of what it unpacks to. */
  readonly maxBytes: number
  /** Rows times columns, or elements of arrays. */
  readonly maxCells: number
  readonly maxColumns: number
  readonly maxLineBytes: number
  readonly maxQuotedBytes: number
  /** Text that may wait in memory for one part of 65,536 rows, over all columns. */
  readonly maxTextBytesPerPart: number
  /** Problems listed for each code; all are counted. */
  readonly maxListed: number
  readonly maxArchiveEntries: number
  /** Time that the reader of a damaged HDF5 file may take for one step. */
  readonly maxAnswerMs: number
}

export const intakeLimits: IntakeLimits = {
  maxBytes: 300_000_000,
  maxCells: 20_000_000,
  maxColumns: 4096,
  maxLineBytes: 8 * 1024 * 1024,
  maxQuotedBytes: 1024 * 1024,
  maxTextBytesPerPart: 64 * 1024 * 1024,
  maxListed: 1000,
  maxArchiveEntries: 1000,
  maxAnswerMs: 30_000,
}

/** Rows of a part of a column: what one chunk holds. */
export const ROWS_PER_PART = 65_536

/** Rows of a part that a table of so many columns can have: one more than the limit on cells allows in all. */
export const partRows = (columns: number, limits: IntakeLimits): number =>
  Math.min(ROWS_PER_PART, Math.floor(limits.maxCells / columns) + 1)
