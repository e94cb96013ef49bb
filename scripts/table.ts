import { readFile } from "node:fs/promises"
import { parseArgs } from "node:util"
import {
  RecipeError,
  type RecipeInput,
  type TableReading,
  fileSource,
  parseRecipe,
  readTable,
} from "@/lib/tables"

const usage = "Usage: npm run --silent table -- FILE [--recipe recipe.json]"

/** What the command prints of a reading. */
function outline({ format, recipe, columns, problems, asks }: TableReading) {
  const open = asks.map(({ line, column, code, message }) => ({ line, column, code, message }))
  return {
    format,
    recipe,
    columns: columns.map(({ name, unit, symbol, role, count, sum, min, max, nanCount, firstValues }) => ({
      name,
      unit,
      symbol,
      role,
      count,
      sum,
      min,
      max,
      nanCount,
      firstValues,
    })),
    problems: [
      ...problems.map(({ line, column, code, message }) => ({ line, column, code, message })),
      ...open,
    ],
  }
}

interface ProblemPlace {
  readonly pointer: string
  readonly code: string
  readonly message: string
}

/** A problem document (RFC 9457); `more` holds its extension members. */
function problem(
  code: string,
  title: string,
  status: number,
  detail: string,
  errors: readonly object[],
  more: object = {},
) {
  return { type: `/problems/${code}`, title, status, detail, code, errors, ...more }
}

function print(document: object, exitCode: number) {
  process.stdout.write(`${JSON.stringify(document, null, 2)}\n`)
  process.exitCode = exitCode
}

async function readRecipe(file: string | undefined): Promise<RecipeInput | null> {
  if (file === undefined) return null
  const text = await readFile(file, "utf8")
  try {
    return parseRecipe(JSON.parse(text))
  } catch (error) {
    if (error instanceof SyntaxError)
      throw new RecipeError([{ pointer: "", message: `Not JSON: ${error.message}.` }])
    throw error
  }
}

function printReading(reading: TableReading) {
  const { refused, asks } = reading
  if (refused) {
    const { code, message, line, column } = refused
    const place = { line, column, code, message }
    print(problem("unreadable-table", "The table cannot be read", 422, message, [place]), 1)
  } else if (asks.length > 0) {
    const detail = "Nothing is accepted before these questions are answered; put the answers into a recipe."
    const errors = asks.map(({ code, message, line, column, choices }) => ({
      line,
      column,
      code,
      message,
      choices,
    }))
    print(
      problem(
        "unanswered-questions",
        "The table leaves questions open",
        422,
        detail,
        errors,
        outline(reading),
      ),
      1,
    )
  } else print(outline(reading), 0)
}

async function main() {
  const { values, positionals } = parseArgs({
    options: { recipe: { type: "string" } },
    allowPositionals: true,
  })
  const [file] = positionals
  if (file === undefined || positionals.length > 1) {
    console.error(usage)
    print(problem("invalid-request", "One file is needed", 400, usage, []), 1)
    return
  }
  try {
    const recipe = await readRecipe(values.recipe)
    const source = await fileSource(file)
    try {
      printReading(await readTable(source, { recipe }))
    } finally {
      await source.close()
    }
  } catch (error) {
    if (error instanceof RecipeError) {
      const errors = error.issues.map(({ pointer, message }): ProblemPlace => ({
        pointer,
        code: "invalid-recipe",
        message,
      }))
      print(problem("invalid-recipe", "The recipe cannot be used", 422, error.message, errors), 1)
      return
    }
    const message = error instanceof Error ? error.message : String(error)
    console.error(message)
    print(problem("unreadable-file", "The file cannot be opened", 404, message, []), 1)
  }
}

await main()
