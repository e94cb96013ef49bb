import type { ThousandsMark } from "./numbers/read-cell"
import type { ColumnKind, ColumnRole } from "./table-reading"

export type TextEncodingName = "utf-8" | "utf-16le" | "utf-16be" | "windows-1252"
/** `blank` is any run of blanks and tabs; the tab is written as the two characters \t. */
export type Delimiter = "," | ";" | "|" | "\\t" | "blank"

/** How one column of the result is read and called. `null` leaves it to the reader. */
export interface RecipeColumn {
  readonly name: string | null
  readonly unit: string | null
  readonly symbol: string | null
  readonly role: ColumnRole | null
  readonly kind: ColumnKind | null
  /** The mark that groups digits. */
  readonly thousands: ThousandsMark | null
  /** Values that mean “missing”; [] says that none do, null that nobody has decided. */
  readonly sentinels: readonly number[] | null
  /** Names of an array's axes. */
  readonly axes: readonly string[] | null
}

export type SegmentMark = "two-blank-lines" | "blank-line" | "repeated-header" | "time-goes-back"

/**
 * How a file is read, as JSON. A reading returns it in full; any part of it can be given back, changed. In what is
 * returned, null marks what an open question asks about. docs/intake.md explains each field.
 */
export interface ReadingRecipe {
  readonly version: 1
  /** Entry of an archive of tables. */
  readonly entry: string | null
  readonly encoding: TextEncodingName | null
  readonly delimiter: Delimiter | null
  readonly decimal: "." | "," | null
  readonly comments: "anywhere" | "top" | null
  readonly commentPrefixes: readonly string[] | null
  /** Physical lines of the names and of the units below them; [] for a file without header. */
  readonly headerLines: readonly number[] | null
  /** Fields of a row; rows with another number are set aside. */
  readonly fields: number | null
  readonly trailingDelimiter: boolean | null
  /** Ranges of physical lines that are not read, both ends included. */
  readonly skipLines: readonly (readonly [number, number])[]
  /** Fill short rows of a delimited file with missing values instead of setting them aside. */
  readonly padShortRows: boolean
  /** A leading column that counts segments. */
  readonly segments: { readonly by: SegmentMark; readonly column: string } | null
  /** Read this block only, counted from 0. */
  readonly block: number | null
  /** Two-dimensional arrays that are read as tables, one column of values for each of theirs; by name. */
  readonly tables: readonly string[] | null
  readonly columns: readonly RecipeColumn[] | null
}

/** What a caller may hand in: any part of a recipe. */
export type RecipeInput = Partial<Omit<ReadingRecipe, "columns">> & {
  readonly columns?: readonly Partial<RecipeColumn>[] | null
}

export interface RecipeIssue {
  readonly pointer: string
  readonly message: string
}

/** A recipe document that cannot be used; `issues` says where and why. */
export class RecipeError extends Error {
  override readonly name = "RecipeError"
  constructor(readonly issues: readonly RecipeIssue[]) {
    super(issues.map(({ pointer, message }) => `${pointer || "/"}: ${message}`).join(" "))
  }
}

type Check = (value: unknown) => string | null

const oneOf =
  (...choices: readonly string[]): Check =>
  (value) =>
    choices.includes(value as string) ? null : `one of ${choices.map((choice) => `“${choice}”`).join(", ")}`
const check =
  (test: (value: unknown) => boolean, what: string): Check =>
  (value) =>
    test(value) ? null : what
const isLine = (value: unknown) => Number.isSafeInteger(value) && (value as number) >= 1
const isCount = (value: unknown) => Number.isSafeInteger(value) && (value as number) >= 0
const isText = (value: unknown) => typeof value === "string" && value.length <= 1000
const listOf =
  (test: (value: unknown) => boolean, most: number) =>
  (value: unknown): boolean =>
    Array.isArray(value) && value.length <= most && value.every(test)
const isRange = (value: unknown) =>
  listOf(isLine, 2)(value) &&
  (value as number[]).length === 2 &&
  (value as number[])[0]! <= (value as number[])[1]!
const isSegments = (value: unknown) =>
  isRecord(value) &&
  ["two-blank-lines", "blank-line", "repeated-header", "time-goes-back"].includes(value.by as string) &&
  isText(value.column)

const fields = new Map<string, Check>([
  ["version", check((value) => value === 1, "the number 1")],
  ["entry", check(isText, "the name of an entry")],
  ["encoding", oneOf("utf-8", "utf-16le", "utf-16be", "windows-1252")],
  ["delimiter", oneOf(",", ";", "|", "\\t", "blank")],
  ["decimal", oneOf(".", ",")],
  ["comments", oneOf("anywhere", "top")],
  [
    "commentPrefixes",
    check(
      listOf((value) => isText(value) && /^[#%!;/*]{1,3}$/.test(value as string), 8),
      "a list of prefixes made of # % ! ; / *",
    ),
  ],
  ["headerLines", check(listOf(isLine, 2), "a list of at most two line numbers")],
  ["fields", check(isLine, "a number of fields")],
  ["trailingDelimiter", check((value) => typeof value === "boolean", "true or false")],
  ["skipLines", check(listOf(isRange, 10_000), "a list of [first, last] line numbers")],
  ["padShortRows", check((value) => typeof value === "boolean", "true or false")],
  ["segments", check(isSegments, "{ by, column }")],
  ["tables", check(listOf(isText, 1000), "a list of names of arrays")],
  ["block", check(isCount, "a block number from 0")],
])

const columnFields = new Map<string, Check>([
  ["name", check((value) => isText(value) && value !== "", "a name")],
  ["unit", check(isText, "a unit")],
  ["symbol", check(isText, "TeX without dollar signs")],
  ["role", oneOf("trajectory", "time", "observable", "uncertainty", "parameter", "coordinate", "weight")],
  ["kind", oneOf("number", "text", "boolean", "datetime")],
  ["thousands", oneOf(",", ".", " ", "'")],
  ["sentinels", check(listOf(Number.isFinite, 100), "a list of numbers")],
  [
    "axes",
    check(
      listOf((value) => isText(value) && value !== "", 16),
      "a list of axis names",
    ),
  ],
])

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === "object" && value !== null && !Array.isArray(value)

function checkFields(
  value: unknown,
  known: ReadonlyMap<string, Check>,
  pointer: string,
  issues: RecipeIssue[],
  except?: string,
) {
  if (!isRecord(value)) {
    issues.push({ pointer, message: "Must be an object." })
    return
  }
  for (const [key, field] of Object.entries(value)) {
    if (key === except) continue
    const place = `${pointer}/${key.replaceAll("~", "~0").replaceAll("/", "~1")}`
    const test = known.get(key)
    if (!test) issues.push({ pointer: place, message: "Recipes have no such field." })
    else if (field !== null) {
      const wanted = test(field)
      if (wanted) issues.push({ pointer: place, message: `Must be ${wanted}, or null.` })
    }
  }
}

/**
 * Checks a recipe that came from outside.
 *
 * @throws RecipeError with every place that is wrong
 */
export function parseRecipe(value: unknown): RecipeInput {
  const issues: RecipeIssue[] = []
  checkFields(value, fields, "", issues, "columns")
  const columns = isRecord(value) ? value.columns : null
  if (Array.isArray(columns))
    columns.forEach((column, index) => checkFields(column, columnFields, `/columns/${index}`, issues))
  else if (columns != null) issues.push({ pointer: "/columns", message: "Must be a list, or null." })
  if (issues.length > 0) throw new RecipeError(issues)
  return value as RecipeInput
}
