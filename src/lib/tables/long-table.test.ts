import { expect, test } from "vitest"
import { type LoadedColumn, longTable } from "./long-table"

const column = (name: string, values: number[], axes: LoadedColumn["axes"] = null): LoadedColumn => ({
  name,
  unit: name === "t" ? "1/J" : null,
  symbol: null,
  axes,
  values: Float64Array.from(values),
})
const axis = (name: string | null, length: number, coordinate: string | null = null) => ({
  name,
  length,
  coordinate,
})
const plain = (table: ReturnType<typeof longTable>) => ({
  ...table,
  columns: table.columns.map(({ name, unit, values }) => [name, unit, ...values]),
})

test("plain columns of one length stay as they are", () => {
  expect(plain(longTable([column("t", [0, 1]), column("n", [5, 4])]))).toEqual({
    rows: 2,
    columns: [
      ["t", "1/J", 0, 1],
      ["n", null, 5, 4],
    ],
    leftOut: [],
  })
})

// C order: the last axis runs fastest (docs/intake.md, Arrays).
test("an array becomes one row an element, with coordinates, indices and repeated single values", () => {
  const table = longTable([
    column("t", [0, 0.5, 1]),
    column("L", [12], []),
    column("mz", [1, 2, 3, 4, 5, 6], [axis("run", 2), axis("time", 3, "t")]),
    column("err", [10, 20, 30, 40, 50, 60], [axis("run", 2), axis("time", 3, "t")]),
    column("seeds", [7, 8]),
  ])
  expect(plain(table)).toEqual({
    rows: 6,
    columns: [
      ["run", null, 0, 0, 0, 1, 1, 1],
      ["time", "1/J", 0, 0.5, 1, 0, 0.5, 1],
      ["L", null, 12, 12, 12, 12, 12, 12],
      ["mz", null, 1, 2, 3, 4, 5, 6],
      ["err", null, 10, 20, 30, 40, 50, 60],
    ],
    leftOut: ["seeds"],
  })
})

test("an axis without a name is numbered", () => {
  const { columns } = longTable([column("a", [1, 2], [axis(null, 2), axis(null, 1)])])
  expect(columns.map(({ name }) => name)).toEqual(["axis_1", "axis_2", "a"])
})

test("single values alone make one row", () => {
  expect(plain(longTable([column("L", [12], [])]))).toMatchObject({ rows: 1, columns: [["L", null, 12]] })
})
