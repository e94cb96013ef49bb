import { describe, expect, test } from "vitest"
import { bytesSource } from "./source/byte-source"
import { compareVersions } from "./compare-versions"
import { readTable } from "./read-table"
import { trajectoryPrints } from "./trajectory-prints"

const read = (text: string) => readTable(bytesSource("runs.csv", Buffer.from(text)))

/** Three trajectories of four times. */
const table = (rows: (run: number, t: number) => string, header = "run,t [1/J],n") =>
  [header, ...[1, 2, 3].flatMap((run) => [0, 1, 2, 3].map((t) => rows(run, t)))].join("\n") + "\n"
const plain = table((run, t) => `${run},${t},${10 * run - t}`)

describe("compareVersions", () => {
  test("finds nothing between a version and itself", async () => {
    const comparison = compareVersions(await read(plain), await read(plain))
    expect(comparison).toMatchObject({ same: true, compatible: true, columns: [], sentences: [] })
  })

  test("tells rows, trajectories and ranges that grew", async () => {
    const longer = `${plain}4,0,40\n4,1,39\n`
    const comparison = compareVersions(await read(plain), await read(longer))
    expect(comparison).toMatchObject({
      same: false,
      compatible: true,
      rows: { from: 12, to: 14 },
      trajectories: { from: 3, to: 4 },
    })
    expect(comparison.columns).toContainEqual({ change: "range", name: "n", from: [7, 30], to: [7, 40] })
    expect(comparison.sentences).toContain("4 trajectories instead of 3.")
  })

  test("tells columns added, removed and renamed", async () => {
    const added = await read(table((run, t) => `${run},${t},${10 * run - t},1`, "run,t [1/J],n,gamma"))
    expect(compareVersions(await read(plain), added)).toMatchObject({
      compatible: true,
      columns: [{ change: "added", name: "gamma" }],
    })
    expect(compareVersions(added, await read(plain))).toMatchObject({
      compatible: false,
      columns: [{ change: "removed", name: "gamma" }],
    })
    const renamed = await read(plain.replace(",n\n", ",density\n"))
    expect(compareVersions(await read(plain), renamed)).toMatchObject({
      compatible: false,
      columns: [{ change: "renamed", name: "n", to: "density" }],
    })
  })

  test("tells another unit, another kind, missing values and changed values", async () => {
    const unit = await read(plain.replace("[1/J]", "[ms]"))
    expect(compareVersions(await read(plain), unit).sentences).toEqual([
      "The unit of “t” is ms instead of 1/J.",
    ])
    const kind = await read(table((run, t) => `${run},${t},${t % 2 === 0 ? "up" : "down"}`))
    expect(compareVersions(await read(plain), kind)).toMatchObject({
      compatible: false,
      columns: [{ change: "kind", name: "n", from: "number", to: "text" }],
    })
    const missing = await read(plain.replace("1,2,8\n", "1,2,\n"))
    expect(compareVersions(await read(plain), missing).columns).toContainEqual({
      change: "missing",
      name: "n",
      from: 0,
      to: 1,
    })
    const changed = await read(plain.replace("1,2,8\n", "1,2,8.5\n"))
    expect(compareVersions(await read(plain), changed).columns).toEqual([{ change: "values", name: "n" }])
  })

  test("names the trajectories that differ when it has their fingerprints", async () => {
    const runs = Float64Array.of(1, 1, 2, 2, 3, 3)
    const before = trajectoryPrints(runs, [Float64Array.of(0, 1, 0, 1, 0, 1), ["a", "b", "a", "b", "a", "b"]])
    const later = Float64Array.of(1, 1, 2, 2, 4, 4)
    const after = trajectoryPrints(later, [
      Float64Array.of(0, 1, 0, 1.5, 0, 1),
      ["a", "b", "a", "b", "a", "b"],
    ])
    const reading = await read(plain)
    const { same, trajectories, sentences } = compareVersions(reading, reading, { before, after })
    expect(same).toBe(false)
    expect(trajectories).toEqual({ from: 3, to: 3, added: [4], removed: [3], changed: [2] })
    expect(sentences).toEqual([
      "1 trajectories are gone: 3.",
      "1 trajectories have other values: 2.",
      "1 trajectories are new: 4.",
    ])
  })

  test("prints do not depend on other trajectories, but on the order of rows", () => {
    const alone = trajectoryPrints(Float64Array.of(7, 7), [Float64Array.of(1, 2)])
    const among = trajectoryPrints(Float64Array.of(6, 7, 6, 7), [Float64Array.of(9, 1, 9, 2)])
    const turned = trajectoryPrints(Float64Array.of(7, 7), [Float64Array.of(2, 1)])
    expect(among.get(7)).toBe(alone.get(7))
    expect(turned.get(7)).not.toBe(alone.get(7))
  })
})
