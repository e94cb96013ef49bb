import type { ColumnSink } from "./column-chunk"
import { detectFormat } from "./detect-format"
import { IntakeRefusal } from "./intake-codes"
import { intakeLimits } from "./intake-limits"
import type { ReadContext, ReadOptions } from "./read-context"
import type { ReadingRecipe, RecipeInput } from "./reading-recipe"
import type { ByteSource } from "./source/byte-source"
import type { TableFormat, TableReading } from "./table-reading"
import { readText } from "./text/read-text"

/**
 * Reads a table from bytes: recognises the format by content, reads every value once and hands the columns to `sink` in
 * parts of 65,536 rows. Memory stays bounded by one part, whatever the size of the file.
 *
 * What cannot be read is in `refused` of the result; only an abort, a failing source and a failing sink throw.
 *
 * @param sink takes the columns; without one only the summary is made
 * @see docs/intake.md
 */
export async function readTable(
  source: ByteSource,
  options: ReadOptions = {},
  sink: ColumnSink | null = null,
): Promise<TableReading> {
  const limits = { ...intakeLimits, ...options.limits }
  const context: ReadContext = { ...options, recipe: options.recipe ?? {}, limits, sink }
  let format: TableFormat = "text"
  try {
    if (source.size > limits.maxBytes)
      throw new IntakeRefusal("file-too-large", { n: source.size, max: limits.maxBytes })
    if (source.size === 0) throw new IntakeRefusal("empty-file")
    const detected = await detectFormat(source)
    format = detected
    return await readText({ open: () => source.stream(), size: source.size }, context)
  } catch (error) {
    if (error instanceof IntakeRefusal) return refusedReading(format, context.recipe, error)
    throw error
  }
}

const openRecipe: ReadingRecipe = {
  version: 1,
  entry: null,
  encoding: null,
  delimiter: null,
  decimal: null,
  comments: null,
  commentPrefixes: null,
  headerLines: null,
  fields: null,
  trailingDelimiter: null,
  skipLines: [],
  padShortRows: false,
  segments: null,
  block: null,
  columns: null,
}

function refusedReading(format: TableFormat, recipe: RecipeInput, refusal: IntakeRefusal): TableReading {
  const { code, message, line, column } = refusal
  return {
    format,
    recipe: { ...openRecipe, ...recipe, columns: null },
    columns: [],
    rows: 0,
    lineAccount: null,
    preview: { first: [], last: [] },
    metadata: [],
    notes: [],
    problems: [],
    problemCounts: [],
    asks: [],
    refused: { code, message, line, column },
  }
}
