import { readFileSync, readdirSync } from "node:fs"
import path from "node:path"
import { gzipSync } from "node:zlib"
import { describe, expect, test } from "vitest"
import fc from "fast-check"
import { bytesSource } from "./source/byte-source"
import { readTable } from "./read-table"
import type { ReadOptions } from "./read-context"

const read = (text: string | Uint8Array, options: ReadOptions = {}, name = "table.csv") =>
  readTable(bytesSource(name, typeof text === "string" ? Buffer.from(text) : text), options)
const fixture = (name: string) => readFileSync(path.resolve("tests/fixtures", name))

describe("gzip", () => {
  const table = Buffer.from("t,n\n0,1\n1,2\n")
  test("of several members is read to its end", async () => {
    const halves = [table.subarray(0, 6), table.subarray(6)]
    expect(await read(Buffer.concat(halves.map((half) => gzipSync(half))))).toMatchObject({
      rows: 2,
      refused: null,
    })
  })
  test.each<[string, (packed: Buffer) => Buffer]>([
    ["cut off", (packed) => packed.subarray(0, -6)],
    [
      "with a wrong checksum",
      (packed) => Buffer.concat([packed.subarray(0, -8), Buffer.alloc(4), packed.subarray(-4)]),
    ],
    ["with a wrong length", (packed) => Buffer.concat([packed.subarray(0, -4), Buffer.alloc(4, 9)])],
    ["cut off within the header", (packed) => packed.subarray(0, 5)],
  ])("%s is refused", async (_, damage) => {
    expect((await read(damage(gzipSync(table)))).refused?.code).toBe("gzip-damaged")
  })
  test("that unpacks to more than the limit is stopped there", async () => {
    const bomb = gzipSync(Buffer.alloc(20_000_000, "1,2\n"))
    expect(bomb.length).toBeLessThan(100_000)
    expect((await read(bomb, { limits: { maxBytes: 2_000_000 } })).refused?.code).toBe("inflate-limit")
  })
  test("inside gzip is refused, and so is an empty one", async () => {
    expect((await read(gzipSync(gzipSync(table)))).refused?.code).toBe("gzip-nested")
    expect((await read(gzipSync(""))).refused?.code).toBe("empty-file")
  })
  test("of another format is unpacked and recognised again", async () => {
    const reading = await read(gzipSync(fixture("structured_big_endian.npy")), {}, "a.npy.gz")
    expect(reading).toMatchObject({ format: "npy", rows: 10 })
    const parquet = await read(gzipSync(fixture("codec_gzip.parquet")), {}, "a.parquet.gz")
    expect(parquet).toMatchObject({ format: "parquet", rows: 64 })
  })
})

describe("limits", () => {
  test.each<[string, string, ReadOptions["limits"], string]>([
    ["a large file", "a,b\n1,2\n", { maxBytes: 5 }, "file-too-large"],
    ["a long line", `a,b\n${"1".repeat(3_000_000)},2\n`, { maxLineBytes: 2_000_000 }, "line-too-long"],
    [
      "a long line at the end",
      `a,b\n1,2\n${"1".repeat(3_000_000)}`,
      { maxLineBytes: 2_000_000 },
      "line-too-long",
    ],
    [
      "many columns",
      `${Array.from({ length: 5000 }, (_, i) => `c${i}`).join()}\n${"1,".repeat(4999)}1\n`,
      {},
      "too-many-columns",
    ],
    ["many columns in one later row", `a,b\n1,2\n3,4\n${"1,".repeat(6000)}1\n`, {}, "too-many-columns"],
    ["many cells", `a,b\n${"1,2\n".repeat(1000)}`, { maxCells: 1000 }, "too-many-cells"],
    [
      "a quote without end",
      `a,b\n${"1,2\n".repeat(500)}1,"${"x\n".repeat(100_000)}`,
      { maxQuotedBytes: 10_000 },
      "quote-not-closed",
    ],
    [
      "much text",
      `a,b\n${`${"word ".repeat(20)},2\n`.repeat(1000)}`,
      { maxTextBytesPerPart: 10_000 },
      "too-much-text",
    ],
    ["nothing", "", {}, "empty-file"],
    ["a header alone", "a,b\n", {}, "header-only"],
    ["comments alone", "# a\n# b\n", {}, "header-only"],
    ["blank lines alone", "\n\n\n", {}, "header-only"],
  ])("%s is refused", async (_, text, limits, code) => {
    const { refused, columns } = await read(text, { limits: limits ?? {} })
    expect(refused?.code).toBe(code)
    expect(columns).toEqual([])
  })
})

describe("names and texts from the file", () => {
  test("stay text, whatever they look like", async () => {
    const names = [
      "=cmd|' /C calc'!A0",
      "<img src=x onerror=alert(1)>",
      "__proto__",
      "$\\input{x}$",
      "constructor",
    ]
    const text = `${names.map((name) => `"${name}"`).join()}\n1,2,3,4,5\n6,7,8,9,10\n`
    const reading = await read(text)
    expect(reading.columns.map(({ name }) => name)).toEqual(names)
    expect(reading.columns.map(({ symbol }) => symbol)).toEqual(names.map(() => null))
    expect(reading.problems.map(({ code, column }) => `${column}:${code}`)).toEqual(
      names.map((_, i) => `${i + 1}:unsafe-name`),
    )
    const again = await read(text, { recipe: JSON.parse(JSON.stringify(reading.recipe)) as never })
    expect(again.columns).toEqual(
      reading.columns.map((column) => ({ ...column, roleReason: "Set in the recipe." })),
    )
    expect(({} as { name?: unknown }).name).toBeUndefined()
  })
  test("metadata keys are no keys of objects", async () => {
    const { metadata } = await read("# __proto__ = 1\n# a b\n1 2\n3 4\n")
    expect(metadata).toEqual([{ key: "__proto__", value: "1", place: 1 }])
  })
  test("long texts in problems are cut", async () => {
    const { problems } = await read(`a,b\n1,2\n3,${"x".repeat(100_000)}\n4,5\n`)
    expect(problems[0]!.text).toHaveLength(200)
    expect(problems[0]!.message.length).toBeLessThan(300)
  })
  test("a pattern that is slow for careless expressions takes no time", async () => {
    const digits = "1".repeat(200_000)
    const started = performance.now()
    await read(`a,b\n${`${digits}x,(${"(".repeat(50_000)}\n`.repeat(5)}1,2\n`)
    await read(`${"[(".repeat(50_000)} a\n1 2\n3 4\n`)
    expect(performance.now() - started).toBeLessThan(20_000)
  })
})

describe("damaged files", () => {
  test("a name that promises another format is mentioned", async () => {
    const reading = await read(fixture("codec_gzip.parquet"), {}, "data.csv")
    expect(reading.format).toBe("parquet")
    expect(reading.problems[0]).toMatchObject({ code: "format-by-content" })
  })
  test.each([0.3, 0.7, 0.99])("Parquet cut to %f of its length is refused", async (share) => {
    const whole = fixture("nulls_dictionary_snappy.parquet")
    const { refused } = await read(whole.subarray(0, Math.floor(whole.length * share)))
    expect(refused?.code).toBe("parquet-damaged")
  })

  const small = readdirSync(path.resolve("tests/fixtures")).filter((name) =>
    /\.(csv|txt|dat|tsv|npy|npz|parquet|gz)$/.test(name),
  )
  test.each(small)("%s with a few wrong bytes is read or refused, and nothing else", async (name) => {
    const whole = fixture(name)
    const change = fc.tuple(fc.nat(whole.length - 1), fc.nat(255))
    await fc.assert(
      fc.asyncProperty(fc.array(change, { minLength: 1, maxLength: 6 }), async (changes) => {
        const damaged = Buffer.from(whole)
        for (const [at, byte] of changes) damaged[at] = byte
        const reading = await read(damaged, { limits: { maxBytes: 20_000_000 } })
        expect(reading.refused === null).toBe(reading.columns.length > 0)
        expect(JSON.parse(JSON.stringify(reading))).toBeTruthy()
      }),
      { numRuns: 15, seed: 1 },
    )
  })
})
