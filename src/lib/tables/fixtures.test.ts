import { readFileSync, readdirSync } from "node:fs"
import path from "node:path"
import { beforeAll, describe, expect, test } from "vitest"
import { bytesSource } from "./source/byte-source"
import { readTable } from "./read-table"
import type { RecipeInput } from "./reading-recipe"
import type { TableReading } from "./table-reading"

const folder = path.resolve("tests/fixtures")

interface ExpectedColumn {
  readonly name: string
  readonly unit?: string
  readonly kind: string
  readonly role?: string
  readonly axes?: readonly string[]
  readonly long_name?: string
  readonly count: number
  readonly missingCount: number
  readonly firstValues: readonly unknown[]
  readonly sum?: number
  readonly sumAbs?: number
  readonly min?: number | null
  readonly max?: number | null
  readonly nanCount?: number
  readonly infCount?: number
}

interface Expected {
  readonly format: TableReading["format"]
  readonly columns: readonly ExpectedColumn[]
  readonly problems: readonly {
    readonly line: number | string
    readonly column: number | null
    readonly code: string
  }[]
  readonly notes: readonly string[]
  readonly metadata?: Record<string, string>
  readonly blockMetadata?: readonly Record<string, string>[]
  readonly encoding?: string
  readonly delimiter?: string
  readonly decimal?: string
  readonly headerLines?: readonly number[]
}

const names = readdirSync(folder)
  .filter((name) => name.endsWith(".expected.json"))
  .map((name) => name.replace(".expected.json", ""))

const places = (problems: Expected["problems"]) =>
  problems.map(({ line, column, code }) => `${line}:${column}:${code}`).sort()

// Files and numbers come from other programs; tests/fixtures/README.md says which. Sums there are exact (math.fsum).
describe.each(names)("%s", (name) => {
  const expected = JSON.parse(readFileSync(path.join(folder, `${name}.expected.json`), "utf8")) as Expected
  const read = (recipe?: RecipeInput) =>
    readTable(bytesSource(name, readFileSync(path.join(folder, name))), { recipe: recipe ?? null })
  let reading: TableReading
  beforeAll(async () => {
    reading = await read()
  })

  test("has the columns and values that its maker wrote", () => {
    expect(reading.refused).toBeNull()
    expect(reading.format).toBe(expected.format)
    expect(reading.columns.map((column) => column.name)).toEqual(
      expected.columns.map((column) => column.name),
    )
    expected.columns.forEach((column, index) => {
      const found = reading.columns[index]!
      const { sum, sumAbs, unit, axes, long_name: longName, ...same } = column
      expect(found).toMatchObject(same)
      if (axes) expect(found.axes?.map((axis) => axis.name)).toEqual(axes)
      if (longName) expect(found.longName).toBe(longName)
      expect(found.unit ?? "").toBe(unit ?? "")
      if (sum !== undefined) expect(Math.abs(found.sum! - sum)).toBeLessThanOrEqual(1e-12 * (sumAbs || 1))
    })
  })

  test("has the listed problems, notes, recipe and metadata", () => {
    const open = reading.asks.map(({ code, line }) => ({ code, line: line ?? "", column: null }))
    expect(places([...(reading.problems as Expected["problems"]), ...open])).toEqual(
      places(expected.problems),
    )
    expect(reading.notes.map(({ code }) => code)).toEqual(expect.arrayContaining([...expected.notes]))
    const { encoding, delimiter, decimal, headerLines } = expected
    const recipe = Object.entries({ encoding, delimiter, decimal, headerLines }).filter(
      ([, value]) => value !== undefined,
    )
    expect(reading.recipe).toMatchObject(Object.fromEntries(recipe))
    for (const [key, value] of Object.entries(expected.metadata ?? {}))
      expect(reading.metadata).toContainEqual(expect.objectContaining({ key, value }))
    expected.blockMetadata?.forEach((entries, block) => {
      for (const [key, value] of Object.entries(entries))
        expect(reading.metadata).toContainEqual(expect.objectContaining({ key, value, block }))
    })
  })

  test("reads the same when its recipe is fed back", async () => {
    const first = reading
    const again = await read(first.recipe)
    expect(again.columns.map(({ roleReason: _, ...column }) => column)).toEqual(
      first.columns.map(({ roleReason: _, ...column }) => column),
    )
    expect(again.recipe).toEqual(first.recipe)
    expect(again.asks).toEqual(first.asks)
  })
})
