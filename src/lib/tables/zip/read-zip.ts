import { ListingReport } from "../arrays/listing-report"
import { readArrays } from "../arrays/read-arrays"
import { IntakeRefusal } from "../intake-codes"
import { IntakeJournal } from "../intake-journal"
import { isPlainName } from "../names/column-names"
import { npySource } from "../npy/npy-source"
import type { ReadContext } from "../read-context"
import type { ByteSource } from "../source/byte-source"
import type { TableReading } from "../table-reading"
import { type ZipEntry, zipDirectory } from "./zip-directory"
import { entryBytes, isInside } from "./zip-entry"

/** Reads a table from the bytes of an entry. */
export type ReadEntry = (
  entry: { readonly name: string; readonly size: number; open(): AsyncIterable<Uint8Array> },
  context: ReadContext,
) => Promise<TableReading>

/**
 * Reads an archive: of arrays (NPZ), or of tables, of which the recipe names one when there are several.
 *
 * @throws IntakeRefusal zip-damaged, zip-too-many, inflate-limit, no-table and those of the entries
 * @see docs/intake.md, gzip, NPZ
 */
export async function readZip(
  source: ByteSource,
  context: ReadContext,
  readEntry: ReadEntry,
): Promise<TableReading> {
  const report = new ListingReport()
  const all = await zipDirectory(source, context.limits)
  const readable = all.filter((entry) => !entry.name.endsWith("/") && isReadable(entry, report))
  const arrays = readable.filter(({ name }) => name.endsWith(".npy"))
  if (arrays.length > 0) return readNpz(source, arrays, readable, context, report)
  const tables = readable.filter(({ name }) => !/(^|\/)(\.|__MACOSX\/)/.test(name))
  if (tables.length === 0) throw report.refusal()
  const { recipe } = context
  const chosen = recipe.entry == null ? tables[0]! : tables.find(({ name }) => name === recipe.entry)
  if (!chosen) throw new IntakeRefusal("zip-no-entry", { name: recipe.entry ?? "" })
  const entry = { name: chosen.name, size: chosen.size, open: () => entryBytes(source, chosen) }
  const reading = await readEntry(entry, context)
  return withArchive(reading, chosen, tables, context, report)
}

function isReadable({ name, encrypted, method }: ZipEntry, report: ListingReport): boolean {
  if (!isInside(name)) report.problem("zip-entry-name", name)
  else if (encrypted || (method !== 0 && method !== 8))
    report.problem("zip-method", name, { method: encrypted ? "encryption" : method })
  else return true
  return false
}

async function readNpz(
  source: ByteSource,
  arrays: readonly ZipEntry[],
  readable: readonly ZipEntry[],
  context: ReadContext,
  report: ListingReport,
): Promise<TableReading> {
  for (const { name } of readable) if (!name.endsWith(".npy")) report.problem("zip-entry-type", name)
  const sources = []
  for (const entry of arrays) {
    const name = entry.name.slice(0, -".npy".length)
    const open = () => entryBytes(source, entry)
    const array = await npySource({ name, place: name, prefix: `${name}.`, size: entry.size, open }, report)
    if (array) sources.push(array)
  }
  if (sources.length === 0) throw report.refusal()
  return readArrays(
    { format: "npz", sources, metadata: [], report: (journal) => report.tell(journal) },
    context,
  )
}

function withArchive(
  reading: TableReading,
  chosen: ZipEntry,
  tables: readonly ZipEntry[],
  { recipe, limits }: ReadContext,
  report: ListingReport,
): TableReading {
  const journal = new IntakeJournal(limits.maxListed)
  report.tell(journal)
  journal.note("zip-table", { name: chosen.name })
  const undecided = tables.length > 1 && recipe.entry == null
  if (undecided)
    journal.ask(
      "zip-tables",
      { n: tables.length },
      tables.slice(0, 100).map(({ name }) => ({
        label: isPlainName(name) ? name : JSON.stringify(name),
        recipe: { entry: name, columns: null },
      })),
    )
  return {
    ...reading,
    recipe: { ...reading.recipe, entry: undecided ? null : chosen.name },
    notes: [...journal.notes, ...reading.notes],
    problems: [...journal.problems, ...reading.problems],
    problemCounts: [...journal.problemCounts, ...reading.problemCounts],
    asks: [...journal.asks, ...reading.asks],
  }
}
