import type { ColumnChunk } from "../column-chunk"
import { NumberWriter, TextWriter, type ColumnWriter } from "../columns/column-writer"
import { describeColumns } from "../columns/describe-columns"
import { finishColumns } from "../columns/finish-columns"
import type { OutputColumn } from "../columns/output-column"
import { IntakeRefusal } from "../intake-codes"
import { IntakeJournal } from "../intake-journal"
import { uniqueNames } from "../names/column-names"
import { openRecipe } from "../open-recipe"
import type { ReadContext } from "../read-context"
import type { MetadataEntry, TableFormat, TableReading } from "../table-reading"
import { recipeColumn } from "../columns/recipe-column"
import { ArrayFailure, type ArraySource, elementsOf } from "./array-source"
import { orderFacts, previewColumns } from "./aligned-columns"
import { axisOrders, nameAxes } from "./name-axes"
import { asTables } from "./array-tables"

/** What the reader of a binary format found before reading any values. */
export interface ArrayListing {
  readonly format: TableFormat
  readonly sources: readonly ArraySource[]
  readonly metadata: readonly MetadataEntry[]
  /** Says again what was noted while listing; a reading may start over. */
  report(journal: IntakeJournal): void
}

/** Values of aligned columns that are kept to see how they move. */
const WATCHED_CELLS = 1_000_000
const WATCHED_ROWS = 65_536

/**
 * Reads the arrays of a binary file into columns, one after another. An array that turns out to be damaged is left out,
 * and the reading starts over without it.
 *
 * @throws IntakeRefusal no-table, too-many-cells, too-many-columns, recipe-mismatch
 */
export async function readArrays(listing: ArrayListing, context: ReadContext): Promise<TableReading> {
  const failures = new Map<ArraySource, ArrayFailure>()
  for (;;) {
    const sources = listing.sources.filter((source) => !failures.has(source))
    const result = await readOnce({ ...listing, sources }, failures, context)
    if (isReading(result)) return result
    for (const [source, failure] of result) failures.set(source, failure)
    context.onRestart?.()
  }
}

type Failures = ReadonlyMap<ArraySource, ArrayFailure>

const isReading = (result: TableReading | Failures): result is TableReading => "refused" in result

async function readOnce(
  listing: ArrayListing,
  before: Failures,
  context: ReadContext,
): Promise<TableReading | Failures> {
  const { limits, recipe, sink, signal, onProgress } = context
  const journal = new IntakeJournal(limits.maxListed, context.onProblem)
  listing.report(journal)
  for (const [{ place }, { code, values }] of before)
    journal.problem(code, { name: place, column: place, ...values }, { line: place })
  const { sources, asked } = asTables(listing.sources, recipe, journal)
  const [failed] = before.values()
  if (sources.length === 0 && failed) throw new IntakeRefusal(failed.code, failed.values)
  checkSize(sources, context)
  const count = sources.reduce((sum, { outputs }) => sum + outputs.length, 0)
  if (recipe.columns && recipe.columns.length !== count) {
    // The recipe may leave out what only reading shows to be unreadable: find out, without giving anything away.
    const blind = { ...context, sink: null, recipe: { ...recipe, columns: null } }
    const result = await readOnce(listing, before, blind)
    if (isReading(result)) throw new IntakeRefusal("recipe-mismatch", { k: recipe.columns.length, n: count })
    return result
  }
  const watched = new Map<string, Float64Array>()
  const { outputs, writersOf } = makeOutputs(sources, asked, context, journal, watched)
  await sink?.start(describeColumns(outputs))
  const totalBytes =
    8 * sources.reduce((sum, { shape, outputs: own }) => sum + elementsOf(shape) * own.length, 0)
  let bytes = 0
  for (const source of sources) {
    signal?.throwIfAborted()
    const writers = writersOf.get(source)!
    try {
      await source.read(writers)
      for (const writer of writers) await writer.end()
    } catch (error) {
      if (error instanceof ArrayFailure)
        return new Map([[listing.sources.find(({ place }) => place === source.place)!, error]])
      throw error
    }
    bytes += 8 * elementsOf(source.shape) * writers.length
    onProgress?.({ phase: "reading", bytes, totalBytes, rows: elementsOf(source.shape) })
    reportPrecision(source, writers, journal)
  }
  return finish(listing, outputs, journal, watched, context)
}

function checkSize(sources: readonly ArraySource[], { limits }: ReadContext): void {
  const columns = sources.reduce((sum, { outputs }) => sum + outputs.length, 0)
  const cells = sources.reduce((sum, { shape, outputs }) => sum + elementsOf(shape) * outputs.length, 0)
  if (columns === 0) throw new IntakeRefusal("no-table")
  if (columns > limits.maxColumns)
    throw new IntakeRefusal("too-many-columns", { place: "", max: limits.maxColumns })
  if (cells > limits.maxCells) throw new IntakeRefusal("too-many-cells", { n: cells, max: limits.maxCells })
}

function makeOutputs(
  sources: readonly ArraySource[],
  asked: ReadonlySet<ArraySource>,
  context: ReadContext,
  journal: IntakeJournal,
  watched: Map<string, Float64Array>,
) {
  const { recipe, sink } = context
  const count = sources.reduce((sum, { outputs }) => sum + outputs.length, 0)
  const given = sources.flatMap((source) => source.outputs.map(({ name }) => ({ name, place: source.place })))
  const names = uniqueNames(
    given.map(({ name }) => name),
    (code, column, values) => journal.problem(code, values, { line: given[column - 1]!.place, column }),
  )
  const outputs: OutputColumn[] = []
  const writersOf = new Map<ArraySource, ColumnWriter[]>()
  const keptRows = Math.min(WATCHED_ROWS, Math.floor(WATCHED_CELLS / count))
  for (const source of sources) {
    const first = outputs.length
    const named = nameAxes(source, sources, recipe.columns?.[first]?.axes ?? null)
    for (const { axis, coordinate } of named.matched)
      journal.note("axis-matched-by-length", { axis: axis + 1, name: source.place, coordinate })
    if (named.open && !asked.has(source)) askAxes(source, first, count, sources, journal)
    const writers = source.outputs.map((output, offset): ColumnWriter => {
      const index = first + offset
      const told = recipe.columns?.[index]
      const name = told?.name ?? names[index]!
      const take = async (part: number, chunk: ColumnChunk) => {
        if (part === 0 && chunk.kind === "number" && named.axes === null)
          watched.set(name, chunk.values.slice(0, keptRows))
        await sink?.chunk(index, part, chunk)
      }
      const isText = output.kind === "text" || output.kind === "datetime"
      const writer = isText ? new TextWriter(take) : new NumberWriter(count, told?.sentinels ?? [], take)
      outputs.push({
        name,
        unit: told?.unit ?? output.unit,
        symbol: output.symbol,
        kind: output.kind,
        axes: named.axes,
        longName: output.longName,
        place: index + 1,
        told,
        summary: () => writer.summary.summary,
        sentinels: writer.kind === "number" ? writer.summary.sentinels : null,
      })
      return writer
    })
    writersOf.set(source, writers)
  }
  return { outputs, writersOf }
}

/** Axes must be named before a file that holds nothing else can be used; otherwise the question stays open. */
function askAxes(
  source: ArraySource,
  first: number,
  columns: number,
  all: readonly ArraySource[],
  journal: IntakeJournal,
): void {
  const values = { n: source.shape.length, name: source.place }
  if (all.some(({ shape }) => shape.length === 1)) {
    journal.note("axes-open", values)
    return
  }
  const choices = axisOrders(source.shape.length).map((axes) => ({
    label: axes.join(" × "),
    recipe: {
      columns: Array.from({ length: columns }, (_, index) =>
        index >= first && index < first + source.outputs.length ? { axes } : {},
      ),
    },
  }))
  journal.ask("axes-unnamed", values, choices, { line: source.place })
}

function reportPrecision(
  source: ArraySource,
  writers: readonly ColumnWriter[],
  journal: IntakeJournal,
): void {
  writers.forEach((writer, index) => {
    if (writer.kind !== "number" || !writer.firstImprecise) return
    const { name } = source.outputs[index]!
    const more = writer.imprecise > 1 ? ` and ${writer.imprecise - 1} more` : ""
    const { text, value } = writer.firstImprecise
    journal.problem("integer-precision", { column: name, text, more, value }, { line: name, text })
  })
}

function finish(
  listing: ArrayListing,
  outputs: readonly OutputColumn[],
  journal: IntakeJournal,
  watched: ReadonlyMap<string, Float64Array>,
  { recipe }: ReadContext,
): TableReading {
  const facts = orderFacts(outputs, watched, journal)
  const columns = finishColumns(outputs, facts, journal)
  const open = new Set(journal.asks.map(({ code }) => code))
  return {
    format: listing.format,
    recipe: {
      ...openRecipe,
      ...recipe,
      version: 1,
      tables: open.has("table-or-array") ? null : (recipe.tables ?? []),
      columns: columns.map((column, index) => recipeColumn(column, outputs[index]!.told)),
    },
    columns,
    rows: Math.max(...columns.map(({ count }) => count)),
    lineAccount: null,
    preview: previewColumns(columns),
    metadata: listing.metadata,
    notes: journal.notes,
    problems: journal.problems,
    problemCounts: journal.problemCounts,
    asks: journal.asks,
    refused: null,
  }
}
