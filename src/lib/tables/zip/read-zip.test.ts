import { crc32, deflateRawSync } from "node:zlib"
import { describe, expect, test } from "vitest"
import { bytesSource } from "../source/byte-source"
import { readTable } from "../read-table"
import type { ReadOptions } from "../read-context"

interface Entry {
  readonly name: string
  readonly data: Uint8Array
  readonly method?: number
  readonly flags?: number
  /** Lies, for archives that were made to harm. */
  readonly size?: number
  readonly crc?: number
  readonly headerAt?: number
}

/** Writes an archive by the letter of PKWARE's specification 6.3.10, section 4.3, or against it where an entry lies. */
function zip(entries: readonly Entry[]): Buffer {
  const locals: Buffer[] = []
  const central: Buffer[] = []
  let at = 0
  for (const { name, data, method = 8, flags = 0, ...lies } of entries) {
    const packed = method === 8 ? deflateRawSync(data) : Buffer.from(data)
    const title = Buffer.from(name)
    const local = Buffer.alloc(30)
    local.writeUInt32LE(0x04034b50, 0)
    local.writeUInt16LE(title.length, 26)
    const entry = Buffer.alloc(46)
    entry.writeUInt32LE(0x02014b50, 0)
    entry.writeUInt16LE(flags, 8)
    entry.writeUInt16LE(method, 10)
    entry.writeUInt32LE(lies.crc ?? crc32(data), 16)
    entry.writeUInt32LE(packed.length, 20)
    entry.writeUInt32LE(lies.size ?? data.length, 24)
    entry.writeUInt16LE(title.length, 28)
    entry.writeUInt32LE(lies.headerAt ?? at, 42)
    locals.push(local, title, packed)
    central.push(entry, title)
    at += 30 + title.length + packed.length
  }
  const directory = Buffer.concat(central)
  const end = Buffer.alloc(22)
  end.writeUInt32LE(0x06054b50, 0)
  end.writeUInt16LE(entries.length, 10)
  end.writeUInt32LE(directory.length, 12)
  end.writeUInt32LE(at, 16)
  return Buffer.concat([...locals, directory, end])
}

/** An NPY file of doubles, as NumPy's format document describes version 1. */
function npy(
  values: number[],
  header = `{'descr': '<f8', 'fortran_order': False, 'shape': (${values.length},), }`,
): Buffer {
  const text = Buffer.from(`${header.padEnd(117)}\n`)
  const start = Buffer.from([0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59, 1, 0, text.length & 255, text.length >> 8])
  return Buffer.concat([start, text, Buffer.from(Float64Array.from(values).buffer)])
}

const read = (bytes: Uint8Array, options: ReadOptions = {}) => readTable(bytesSource("a.npz", bytes), options)
const places = ({ problems }: Awaited<ReturnType<typeof read>>) =>
  problems.map(({ line, code }) => `${line}:${code}`)
const good: Entry = { name: "x.npy", data: npy([1, 2, 3]) }

describe("an archive of arrays", () => {
  test("is read, stored or deflated", async () => {
    const reading = await read(zip([good, { name: "y.npy", data: npy([4, 5, 6]), method: 0 }]))
    expect(reading).toMatchObject({ format: "npz", refused: null })
    expect(reading.columns.map(({ name, sum }) => [name, sum])).toEqual([
      ["x", 6],
      ["y", 15],
    ])
  })

  test.each(["../x.npy", "/etc/x.npy", "a\\x.npy", "C:x.npy", "a/../../x.npy", "x\0.npy"])(
    "never uses the name %j",
    async (name) => {
      const reading = await read(zip([good, { name, data: npy([9]) }]))
      expect(reading.columns.map((column) => column.name)).toEqual(["x"])
      expect(places(reading)).toEqual([`${name}:zip-entry-name`])
    },
  )

  test("keeps a name such as __proto__ as text", async () => {
    const reading = await read(
      zip([
        { ...good, name: "__proto__.npy" },
        { ...good, name: "constructor.npy" },
      ]),
    )
    expect(reading.columns.map(({ name, sum }) => [name, sum])).toEqual([
      ["__proto__", 6],
      ["constructor", 6],
    ])
    expect(places(reading)).toEqual(["__proto__:unsafe-name", "constructor:unsafe-name"])
    expect(({} as { sum?: unknown }).sum).toBeUndefined()
  })

  test("leaves out what is encrypted, packed otherwise or no array", async () => {
    const reading = await read(
      zip([
        good,
        { name: "secret.npy", data: npy([1]), flags: 1 },
        { name: "lzma.npy", data: npy([1]), method: 14 },
        { name: "notes.txt", data: Buffer.from("hello") },
      ]),
    )
    expect(reading.columns).toHaveLength(1)
    expect(places(reading)).toEqual([
      "secret.npy:zip-method",
      "lzma.npy:zip-method",
      "notes.txt:zip-entry-type",
    ])
  })

  test.each<[string, Entry[]]>([
    ["a wrong checksum", [{ ...good, crc: 1 }]],
    ["a wrong checksum of a stored entry", [{ ...good, method: 0, crc: 1 }]],
    ["an entry longer than declared", [{ ...good, size: good.data.length - 8 }]],
    ["entries that overlap", [good, { ...good, name: "y.npy", headerAt: 0 }]],
    ["a header outside the file", [{ ...good, headerAt: 1 << 30 }]],
  ])("is refused for %s", async (_, entries) => {
    expect((await read(zip(entries))).refused?.code).toBe("zip-damaged")
  })

  test("is refused when it was cut off", async () => {
    const whole = zip([good])
    expect((await read(whole.subarray(0, -10))).refused?.code).toBe("zip-damaged")
  })

  test("is refused before unpacking when it declares too much, and while unpacking when it lies", async () => {
    const bomb = { name: "x.npy", data: Buffer.alloc(4_000_000) }
    const limits = { maxBytes: 1_000_000 }
    expect((await read(zip([bomb]), { limits })).refused?.code).toBe("inflate-limit")
    expect((await read(zip([{ ...bomb, size: 1000 }]), { limits })).refused).not.toBeNull()
    expect(
      (await read(zip(Array(5).fill(good) as Entry[]), { limits: { maxArchiveEntries: 4 } })).refused?.code,
    ).toBe("zip-too-many")
  })

  test.each<[string, Buffer, string]>([
    ["pickled objects", npy([1], "{'descr': '|O', 'fortran_order': False, 'shape': (1,), }"), "npy-object"],
    [
      "more values than bytes",
      npy([1], "{'descr': '<f8', 'fortran_order': False, 'shape': (999999999,), }"),
      "npy-truncated",
    ],
    [
      "a type that is not read",
      npy([1, 2], "{'descr': '<f16', 'fortran_order': False, 'shape': (1,), }"),
      "npy-dtype",
    ],
    [
      "a header that calls something",
      npy([1], "{'descr': __import__('os').system('true'), 'shape': (1,)}"),
      "npy-header",
    ],
    ["a header of lists without end", npy([1], "[".repeat(100)), "npy-header"],
    [
      "bytes after the array",
      npy([1, 2], "{'descr': '<f8', 'fortran_order': False, 'shape': (1,), }"),
      "npy-extra-bytes",
    ],
  ])("tells of an entry with %s", async (_, data, code) => {
    const reading = await read(zip([good, { name: "bad.npy", data }]))
    expect(places(reading)).toEqual([`bad:${code}`])
  })

  test("refuses a file that is one array of objects", async () => {
    const bytes = npy([1], "{'descr': '|O', 'fortran_order': False, 'shape': (1,), }")
    expect((await readTable(bytesSource("a.npy", bytes))).refused?.code).toBe("npy-object")
  })
})

describe("an archive of tables", () => {
  const csv = (text: string) => Buffer.from(text)
  test("of one table is read as that", async () => {
    const reading = await read(zip([{ name: "run/a.csv", data: csv("t,n\n0,1\n1,2\n") }]))
    expect(reading).toMatchObject({ format: "text", rows: 2, recipe: { entry: "run/a.csv" } })
    expect(reading.notes.map(({ code }) => code)).toContain("zip-table")
  })
  test("of several is asked about, and the answer is read", async () => {
    const bytes = zip([
      { name: "a.csv", data: csv("t,n\n0,1\n") },
      { name: "b.csv", data: csv("t,m\n0,5\n1,6\n") },
    ])
    const open = await read(bytes)
    expect(open.asks.map(({ code }) => code)).toEqual(["zip-tables"])
    expect(open.recipe.entry).toBeNull()
    const answer = open.asks[0]!.choices[1]!.recipe
    const reading = await read(bytes, {
      recipe: { ...open.recipe, ...answer, headerLines: null, fields: null },
    })
    expect(reading.asks).toEqual([])
    expect(reading.columns.map(({ name, sum }) => [name, sum])).toEqual([
      ["t", 1],
      ["m", 11],
    ])
  })
  test("with an archive inside is refused", async () => {
    const inner = zip([{ name: "a.csv", data: csv("t,n\n0,1\n") }])
    expect((await read(zip([{ name: "inner.zip", data: inner }]))).refused?.code).toBe("gzip-nested")
  })
})
