import { describe, expect, test } from "vitest"
import { collectColumns } from "../collect-columns"
import { bytesSource } from "../source/byte-source"
import { readTable } from "../read-table"
import type { ReadOptions } from "../read-context"

const read = (text: string | Uint8Array, options: ReadOptions = {}) =>
  readTable(bytesSource("table.txt", typeof text === "string" ? Buffer.from(text) : text), options)

async function values(text: string, options: ReadOptions = {}) {
  const collected = collectColumns()
  const reading = await readTable(bytesSource("table.txt", Buffer.from(text)), options, collected.sink)
  return { reading, columns: collected.columns().map((column) => [column.name, ...column.values]) }
}
const codes = (list: readonly { readonly code: string }[]) => list.map(({ code }) => code)

// Rules and codes: docs/intake.md.
describe("the header", () => {
  test("a comment with = or : is metadata and never a header", async () => {
    const { columns, metadata } = await read("# a b c\n# T = 0.35\n1 2 3\n4 5 6\n")
    expect(columns.map(({ name }) => name)).toEqual(["a", "b", "c"])
    expect(metadata).toEqual([{ key: "T", value: "0.35", place: 2 }])
  })
  test("columns may be called t, T, f, nan", async () => {
    const { columns } = await read("t,T,f,nan\n1,2,3,4\n5,6,7,8\n")
    expect(columns.map(({ name, kind }) => `${name}:${kind}`)).toEqual([
      "t:number",
      "T:number",
      "f:number",
      "nan:number",
    ])
  })
  test("a row with a number is no header", async () => {
    const { columns, notes, problems } = await read("x,1\n2,3\n4,5\n")
    expect(columns.map(({ name }) => name)).toEqual(["column_1", "column_2"])
    expect(codes(notes)).toContain("no-header")
    expect(problems).toMatchObject([{ line: 1, column: 1, code: "not-a-number", text: "x" }])
  })
  test("text over text is asked about, and the answer is kept", async () => {
    const text = "who,where\nada,here\nbo,there\n"
    const open = await read(text)
    expect(codes(open.asks)).toEqual(["header-guessed"])
    expect(open.recipe.headerLines).toBeNull()
    const [yes, no] = open.asks[0]!.choices
    const named = await read(text, { recipe: { ...open.recipe, ...yes!.recipe } })
    expect(named.asks).toEqual([])
    expect(named.columns.map(({ name, count }) => `${name}:${count}`)).toEqual(["who:2", "where:2"])
    const bare = await read(text, { recipe: { ...open.recipe, columns: null, ...no!.recipe } })
    expect(bare.asks).toEqual([])
    expect(bare.columns.map(({ name, count }) => `${name}:${count}`)).toEqual(["column_1:3", "column_2:3"])
  })
  test("a name too few in a blank-delimited file is asked about", async () => {
    const { asks } = await read("a b\n1 2 3\n4 5 6\n")
    expect(codes(asks)).toEqual(["header-count-mismatch"])
  })
  test("names with blanks are kept when wide gaps part them", async () => {
    const { columns } = await read("# Zeit t [s]   Spannung U [V]\n1 2\n3 4\n")
    expect(columns.map(({ name, unit }) => [name, unit])).toEqual([
      ["Zeit t", "s"],
      ["Spannung U", "V"],
    ])
  })
  test("a row of words below the names is data unless every word is a unit", async () => {
    const { problems, columns } = await read("time,phase\nsoon,late\n1,2\n3,4\n")
    expect(columns[0]!.count).toBe(3)
    expect(problems).toHaveLength(2)
  })
})

describe("delimiter and decimal mark", () => {
  test("a decimal comma that could group thousands is asked about", async () => {
    const text = "a;b\n1,234;5,678\n2,345;6,789\n"
    const open = await read(text)
    expect(codes(open.asks)).toEqual(["decimal-ambiguous"])
    const [small, large] = open.asks[0]!.choices
    const answer = async (recipe: object) =>
      (await values(text, { recipe: { ...open.recipe, ...recipe } })).columns[0]
    expect(await answer(small!.recipe)).toEqual(["a", 1.234, 2.345])
    expect(await answer(large!.recipe)).toEqual(["a", 1234, 2345])
  })
  test("one cell that cannot group thousands settles it", async () => {
    const { asks, notes } = await read("a;b\n1,234;5,678\n2,345;0,789\n")
    expect(asks).toEqual([])
    expect(codes(notes)).toContain("decimal-comma")
  })
  test("two readings of the same worth are asked about", async () => {
    const { asks, recipe } = await read("ada l,bo k\ncy m,di n\n")
    expect(codes(asks)).toContain("delimiter-unsure")
    expect(recipe).toMatchObject({ delimiter: null, columns: null })
    expect(asks.find(({ code }) => code === "delimiter-unsure")!.choices).toHaveLength(2)
  })
  test("bars, and the ties between tab and blanks", async () => {
    expect((await read("a|b\n1|2\n")).recipe.delimiter).toBe("|")
    expect((await read("a\tb\n1\t2\n")).recipe.delimiter).toBe("\\t")
    expect((await read("a \tb\n1  2\n")).recipe.delimiter).toBe("blank")
  })
  test("a single column", async () => {
    const { notes, columns } = await read("x\n1.5\n2.5\n")
    expect(codes(notes)).toContain("single-column")
    expect(columns).toMatchObject([{ name: "x", sum: 4 }])
  })
  test("the recipe overrules what was found", async () => {
    const { columns } = await values("a b;c d\n1;2\n", { recipe: { delimiter: ";" } })
    expect(columns).toEqual([
      ["a b", 1],
      ["c d", 2],
    ])
  })
})

describe("lines", () => {
  test("every kind of line is accounted for", async () => {
    const text = "# note\nt x\n1 2\n\n2 3 # aside\n\n\n3 4\n5\nt x\n4 5\n# k = v\n"
    const { lineAccount, recipe } = await read(text)
    expect(lineAccount).toEqual({
      physical: 12,
      rows: 4,
      setAside: 1,
      headers: 1,
      repeatedHeaders: 1,
      comments: 2,
      blanks: 3,
      skipped: 0,
    })
    expect(recipe.segments).toEqual({ by: "two-blank-lines", column: "block" })
  })
  test("CR, LF and CR LF in one file", async () => {
    const { problems, notes, columns } = await read("a,b\r\n1,2\n3,4\r5,6\r\n")
    expect(columns[0]).toMatchObject({ count: 3, sum: 9 })
    expect(codes(notes)).toContain("mixed-line-ends")
    expect(problems).toMatchObject([{ line: 3, code: "stray-cr" }])
  })
  test("quotes over several lines, doubled and stray", async () => {
    const { reading, columns } = await values('s,x\n"a\r\nb ""c""",1\n"d"e,2\n f ,3\n')
    expect(columns).toEqual([
      ["s", 'a\r\nb "c"', "f"],
      ["x", 1, 3],
    ])
    expect(reading.problems).toMatchObject([{ line: 4, code: "quote-stray" }])
    expect(reading.lineAccount).toMatchObject({ physical: 5, rows: 3, setAside: 1, headers: 1 })
  })
  test("a quote that is never closed is refused at its line", async () => {
    const { refused } = await read('s,x\n1,2\n3,"4\n5,6\n')
    expect(refused).toMatchObject({ code: "quote-not-closed", line: 3, column: 2 })
  })
  test("the same results however the bytes are cut into pieces", async () => {
    const text = 's;x\n"µ\n""q""";1,5\n\u2212x;\u22122,25\nb;3\r\n'
    const whole = await values(text)
    const bytes = Buffer.from(text)
    for (const size of [1, 2, 3, 7]) {
      const collected = collectColumns()
      const source = bytesSource("table.txt", bytes)
      async function* stream() {
        for (let at = 0; at < bytes.length; at += size) yield bytes.subarray(at, at + size)
      }
      const reading = await readTable({ ...source, stream }, {}, collected.sink)
      expect(collected.columns().map((column) => [column.name, ...column.values])).toEqual(whole.columns)
      expect(reading.lineAccount).toEqual(whole.reading.lineAccount)
    }
  })
  test("skipped lines and padded rows are as the recipe says", async () => {
    const text = "a,b,c\n1,2,3\n4,5\n6,7,8\n9,9,9\n"
    const { reading, columns } = await values(text, { recipe: { padShortRows: true, skipLines: [[4, 4]] } })
    expect(columns).toEqual([
      ["a", 1, 4, 9],
      ["b", 2, 5, 9],
      ["c", 3, NaN, 9],
    ])
    expect(reading.lineAccount).toMatchObject({ skipped: 1, setAside: 0 })
    expect(codes(reading.notes)).toContain("padded-rows")
  })
})

describe("comments", () => {
  test("in a comma file without comments above, a prefix line with the columns of a row is a row", async () => {
    const { reading, columns } = await values("s,x\na,1\n#7,2\n# aside\nb,3\n")
    expect(columns[0]).toEqual(["s", "a", "#7", "b"])
    expect(reading.problems).toMatchObject([{ line: 4, code: "comment-midfile" }])
  })
  test("rows that were commented out are pointed at", async () => {
    const { notes } = await read("# a b\n1 2\n# 3 4\n5 6\n")
    expect(notes).toContainEqual(expect.objectContaining({ code: "commented-rows", lines: [3] }))
  })
  test("a comment after a row is its note", async () => {
    const { notes } = await read("a b\n1 2 # bad run\n3 4\n")
    expect(notes).toContainEqual(
      expect.objectContaining({ code: "trailing-comment", lines: [2], texts: ["# bad run"] }),
    )
  })
  test("; begins a comment unless it is the delimiter", async () => {
    expect((await read("; c\na b\n1 2\n")).lineAccount?.comments).toBe(1)
    expect((await read("a;b\n;2\n1;3\n")).columns[0]).toMatchObject({ count: 2, missingCount: 1 })
  })
})

describe("segments", () => {
  test("blocks of other widths are asked about, and each can be read", async () => {
    const text = "1 2\n3 4\n\n\n5 6 7\n8 9 1\n"
    const open = await read(text)
    expect(codes(open.asks)).toEqual(["blocks-differ"])
    const other = open.asks[0]!.choices.at(-1)!
    const { columns, reading } = await values(text, {
      recipe: { ...open.recipe, columns: null, ...other.recipe },
    })
    expect(reading.asks).toEqual([])
    expect(columns.map((column) => column.slice(1))).toEqual([
      [1, 3],
      [2, 4],
    ])
  })
  test("a new trajectory at each repeated header, or wherever time falls, once the user says so", async () => {
    const text = "t x\n0 1\n1 2\nt x\n0 3\n1 4\n"
    const plain = await read(text)
    expect(codes(plain.problems)).toEqual(["repeated-header", "time-goes-back"])
    for (const by of ["repeated-header", "time-goes-back"] as const) {
      const { reading, columns } = await values(text, { recipe: { segments: { by, column: "trajectory" } } })
      expect(columns[0]).toEqual(["trajectory", 0, 0, 1, 1])
      expect(codes(reading.problems)).not.toContain("time-goes-back")
    }
  })
})

describe("the whole file overrules its sample", () => {
  const rows = (count: number, row: (index: number) => string) =>
    Array.from({ length: count }, (_, i) => row(i)).join("\n")
  test("a flag that becomes a number is read again as numbers", async () => {
    const text = `i,flag\n${rows(1000, (i) => `${i},${i === 700 ? 3 : i % 2 === 0 ? "T" : "F"}`)}\n`
    const { reading } = await values(text)
    expect(reading.columns[1]).toMatchObject({ kind: "text", count: 1000 })
  })
  test("and the sink is told to start over", async () => {
    const text = `i,x\n${rows(100_000, (i) => `${i},${i < 60_000 || i > 99_000 ? i : "word"}`)}\n`
    const more = text.replace(/,(\d+)\n/g, (whole, digits: string) =>
      Number(digits) > 400 && Number(digits) < 99_000 ? ",word\n" : whole,
    )
    const starts: string[] = []
    const rowsSeen: number[] = []
    const reading = await readTable(
      bytesSource("table.csv", Buffer.from(more)),
      {},
      {
        start: (columns) => {
          starts.push(columns.map(({ kind }) => kind).join())
          rowsSeen.length = 0
        },
        chunk: (index, part, chunk) => {
          if (index === 1) rowsSeen[part] = chunk.rows
        },
      },
    )
    expect(starts).toEqual(["number,number", "number,text"])
    expect(rowsSeen).toEqual([65_536, 34_464])
    expect(reading.problems).toEqual([])
  })
  test("a width that the sample did not show", async () => {
    const text = `${rows(300, (i) => `${i} 1`)}\n${rows(5000, (i) => `${i} 1 2`)}\n${rows(70, (i) => `${i} 1`)}\n`
    const { columns, problemCounts } = await read(text)
    expect(columns).toHaveLength(3)
    expect(problemCounts).toContainEqual({ code: "ragged-short", count: 370 })
  })
})

describe("cells", () => {
  test("a marker for missing is asked about, and the answer is used", async () => {
    const text = `a,b\n${Array.from({ length: 12 }, (_, i) => `${i},${i % 4 === 0 ? -999 : 0.5}`).join("\n")}\n`
    const open = await read(text)
    expect(codes(open.asks)).toEqual(["sentinel-suspected"])
    const [value, missing] = open.asks[0]!.choices
    const merged = (patch: typeof value) => ({
      ...open.recipe,
      columns: open.recipe.columns!.map((column, index) => ({ ...column, ...patch!.recipe.columns![index] })),
    })
    expect((await read(text, { recipe: merged(value) })).columns[1]).toMatchObject({
      min: -999,
      missingCount: 0,
    })
    const without = await read(text, { recipe: merged(missing) })
    expect(without.columns[1]).toMatchObject({ min: 0.5, missingCount: 3 })
    expect(without.asks).toEqual([])
  })
  test("digit groups are missing until their mark is named", async () => {
    const text = 'run,sweeps\n1,"999"\n2,"1,250,000"\n'
    const found = await read(text)
    expect(found.problems).toMatchObject([
      { line: 3, column: 2, code: "thousands-separator", text: "1,250,000" },
    ])
    const columns = [{}, { thousands: "," as const }]
    expect((await read(text, { recipe: { columns } })).columns[1]).toMatchObject({
      sum: 1_250_999,
      missingCount: 0,
    })
  })
  test("long identifiers can be kept as text", async () => {
    const text = "id,x\n12345678901234567890,1\n12345678901234567891,2\n"
    expect(codes((await read(text)).problems)).toEqual(["integer-precision", "integer-precision"])
    const { columns, reading } = await values(text, { recipe: { columns: [{ kind: "text" }, {}] } })
    expect(columns[0]).toEqual(["id", "12345678901234567890", "12345678901234567891"])
    expect(reading.problems).toEqual([])
  })
  test("problems are listed up to a cap and counted beyond it", async () => {
    const text = `a,b\n${Array.from({ length: 3000 }, (_, i) => `${i},${i % 2 === 0 ? "x" : i}`).join("\n")}\n`
    const seen: number[] = []
    const reading = await read(text, { onProblem: ({ line }) => seen.push(Number(line)) })
    expect(reading.problems).toHaveLength(1000)
    expect(reading.problemCounts).toEqual([{ code: "not-a-number", count: 1500 }])
    expect(seen).toHaveLength(1500)
  })
  test("names, units, roles and symbols of the recipe are used", async () => {
    const columns = [
      { name: "time", unit: "s", role: "time" as const, symbol: "t" },
      { role: "observable" as const },
    ]
    const reading = await read("a,b\n1,2\n0,3\n", { recipe: { columns } })
    expect(reading.columns).toMatchObject([
      { name: "time", unit: "s", role: "time", symbol: "t" },
      { name: "b", role: "observable" },
    ])
    expect(codes(reading.problems)).toEqual(["time-goes-back"])
  })
  test("a recipe for another table is refused", async () => {
    expect((await read("a,b\n1,2\n", { recipe: { columns: [{}] } })).refused).toMatchObject({
      code: "recipe-mismatch",
    })
  })
})

describe("encodings", () => {
  test("a byte that is no UTF-8 at the very end makes the file windows-1252", async () => {
    const bytes = Buffer.concat([
      Buffer.from("s,x\n"),
      Buffer.from("a,1\n".repeat(50_000)),
      Buffer.from([0xb5, 0x2c, 0x32, 0x0a]),
    ])
    const reading = await read(bytes)
    expect(reading.recipe.encoding).toBe("windows-1252")
    expect(codes(reading.problems)).toEqual(["encoding-guessed"])
    expect(reading.columns[0]).toMatchObject({ kind: "text", distinctCount: 2 })
  })
  test("UTF-16 without a mark is guessed", async () => {
    const reading = await read(Buffer.from("a\tb\n1\t2\n3\t4\n", "utf16le"))
    expect(reading.recipe.encoding).toBe("utf-16le")
    expect(codes(reading.problems)).toEqual(["encoding-guessed"])
    expect(reading.columns[1]).toMatchObject({ name: "b", sum: 6 })
  })
  test("blanks outside ASCII are blanks", async () => {
    expect((await values("a b\n1\u00a02\n3\u20094\n")).columns).toEqual([
      ["a", 1, 3],
      ["b", 2, 4],
    ])
  })
  test("UTF-32 and zero bytes are refused", async () => {
    expect((await read(Uint8Array.of(0xff, 0xfe, 0, 0, 0x61, 0, 0, 0))).refused?.code).toBe(
      "encoding-unknown",
    )
    expect((await read("a,b\n1,2\n3,\u00004\n")).refused).toMatchObject({
      code: "binary-in-text",
      line: 3,
      column: 2,
    })
  })
})
