/**
 * Reading tables: bytes to typed columns. `readTable(source, options, sink)` recognises the format by content, reads
 * every value once and hands the columns to the sink in parts of 65,536 rows; both calls of the sink are awaited. When
 * the whole file contradicts its sample, `sink.start` is called AGAIN and everything before it is void. What cannot be
 * read is `refused` in the result. `chunkBytes` gives the stored form of a chunk.
 */
export { type ByteSource, bytesSource } from "./source/byte-source"
export { fileSource } from "./source/file-source"
export { readTable } from "./read-table"
export type { ReadOptions, ReadingProgress } from "./read-context"
export {
  type ColumnChunk,
  type ColumnSink,
  type NumberChunk,
  type TextChunk,
  chunkBytes,
  isValid,
  textsOfBytes,
} from "./column-chunk"
export type * from "./table-reading"
export {
  type ReadingRecipe,
  type RecipeColumn,
  type RecipeInput,
  type RecipeIssue,
  RecipeError,
  parseRecipe,
} from "./reading-recipe"
export { type IntakeCodeName, type Severity, IntakeRefusal, intakeCodes, sentence } from "./intake-codes"
export { type IntakeLimits, ROWS_PER_PART, intakeLimits } from "./intake-limits"
export { collectColumns, type CollectedColumn } from "./collect-columns"
export {
  type ColumnChange,
  type TrajectoryChange,
  type TrajectoryPrints,
  type VersionComparison,
  compareVersions,
} from "./compare-versions"
export { trajectoryPrints } from "./trajectory-prints"
export { type LoadedColumn, type LongTable, longTable } from "./long-table"
