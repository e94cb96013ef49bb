import { readFile } from "node:fs/promises"
import { Problem } from "@/lib/contracts/problems"
import {
  collectColumns,
  fileSource,
  parseRecipe,
  readTable,
  RecipeError,
  type RecipeInput,
  type TableReading,
} from "@/lib/tables"
import { costsData } from "@/lib/tables/costs-data"
import type { DataTable } from "@specs/figure-kind"

/** One table of a figure: where it lies and how it is read. */
export interface DataFile {
  readonly name: string
  readonly path: string
  readonly recipe: string | null
}

/** Lines about one file, beyond which nobody reads. */
const mostTold = 10

/**
 * Reads a data file whole.
 *
 * @param acceptLosses whether cells and rows that cannot be read may be left out
 * @param tell takes one line about each thing that did not stop the reading
 * @throws Problem unreadable-table with the place of everything that stopped it
 */
export async function readData(
  { name, path, recipe }: DataFile,
  acceptLosses: boolean,
  tell: (line: string) => void,
): Promise<DataTable> {
  const collected = collectColumns()
  const reading = await readOf(name, path, async (source) =>
    readTable(source, { recipe: await readRecipe(name, recipe) }, collected.sink),
  )
  const stopping = stoppedBy(reading, acceptLosses)
  if (stopping.length > 0) {
    const what = reading.refused ? "cannot be read" : "cannot be read without a loss or an answer"
    const hint =
      reading.refused || reading.asks.length > 0
        ? "Correct the file, or say how to read it with --recipe."
        : "Correct the file, or add --accept-missing to leave these out."
    throw new Problem(
      "unreadable-table",
      `${path} ${what}. ${hint}`,
      stopping.map(({ code, message }) => ({ pointer: `/data/${name}`, code, message })),
    )
  }
  for (const { message } of reading.problems.slice(0, mostTold)) tell(`${name}: ${message}`)
  const untold = reading.problemCounts.reduce((sum, { count }) => sum + count, 0) - mostTold
  if (untold > 0) tell(`${name}: And ${untold} more; npm run table lists them.`)
  return { rows: reading.rows, columns: collected.columns() }
}

function stoppedBy({ refused, asks, problems, problemCounts }: TableReading, acceptLosses: boolean) {
  if (refused) return [refused]
  const lost = acceptLosses ? [] : problems.filter(({ code }) => costsData(code))
  const all = problemCounts.reduce((sum, { code, count }) => sum + (costsData(code) ? count : 0), 0)
  const rest = all - lost.length
  const more = rest > 0 && !acceptLosses ? [{ code: "more", message: `And ${rest} more places.` }] : []
  return [...asks, ...lost, ...more]
}

async function readOf<T>(
  name: string,
  path: string,
  read: (source: Awaited<ReturnType<typeof fileSource>>) => Promise<T>,
): Promise<T> {
  const source = await fileSource(path).catch((error: Error) => {
    throw new Problem("not-found", `The file of ${name} cannot be opened: ${error.message}`)
  })
  try {
    return await read(source)
  } finally {
    await source.close()
  }
}

async function readRecipe(name: string, path: string | null): Promise<RecipeInput | null> {
  if (path === null) return null
  try {
    return parseRecipe(JSON.parse(await readFile(path, "utf8")))
  } catch (error) {
    const issues =
      error instanceof RecipeError ? error.issues : [{ pointer: "", message: (error as Error).message }]
    throw new Problem(
      "unreadable-table",
      `The recipe of ${name} cannot be used.`,
      issues.map(({ pointer, message }) => ({ pointer, code: "invalid-recipe", message })),
    )
  }
}
