import { spawnSync } from "node:child_process"
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs"
import { tmpdir } from "node:os"
import path from "node:path"
import { fileURLToPath } from "node:url"
import sharp from "sharp"
import { readData } from "./figure/read-data"
import { afterAll, beforeAll, describe, expect, test } from "vitest"

const root = fileURLToPath(new URL("..", import.meta.url))
const reference = (name: string) => path.join(root, "tests/reference/data/scipy", name)
let folder: string
beforeAll(() => {
  folder = mkdtempSync(path.join(tmpdir(), "afterquench-figure-"))
})
afterAll(() => rmSync(folder, { recursive: true }))

const panel = {
  kind: "decay-exponent",
  data: { dataset: "small", columns: { trajectory: "trajectory", time: "t", observable: "n" } },
}

function file(name: string, content: object | string): string {
  const at = path.join(folder, name)
  writeFileSync(at, typeof content === "string" ? content : JSON.stringify(content))
  return at
}

/** Runs the command as a person would. */
function figure(...args: string[]) {
  const { status, stdout, stderr } = spawnSync(
    process.execPath,
    [path.join(root, "scripts/run-ts.mjs"), "scripts/figure.ts", ...args],
    { cwd: root, encoding: "utf8" },
  )
  return { status, stderr, document: JSON.parse(stdout) }
}

describe("a figure without server and database", () => {
  test("computes, draws, prints what it writes", async () => {
    const out = path.join(folder, "made")
    const spec = file("spec.json", { version: 1, size: { widthMm: 86, heightMm: 60 }, panels: [panel] })
    const { status, document } = figure(
      "--spec",
      spec,
      "--data",
      `small=${reference("small_ensemble.csv")}`,
      "--out",
      out,
    )
    expect(status).toBe(0)
    expect(readdirSync(out).sort()).toEqual(["figure.pdf", "figure.png", "figure.svg", "results.json"])
    expect(JSON.parse(readFileSync(path.join(out, "results.json"), "utf8"))).toEqual(document)
    const [exponent] = document.panels[0].curves[0].quantities
    // NumPy's answer on these twelve trajectories: tests/reference/data/SOURCE.md.
    const expected = JSON.parse(readFileSync(reference("small_ensemble.json"), "utf8")).recommendedDefault
    expect(exponent.value).toBeCloseTo(expected.slope, 10)
    expect(exponent.standardError).toBeCloseTo(expected.jackknifeSE, 10)
    expect(exponent.interval.low).toBeCloseTo(expected.ci["0.95"][0], 10)
    expect(exponent.text).toBe("-0.498(10)")
    // 86 mm at 300 dots an inch are 1016 pixels, 60 mm are 709 (arithmetic).
    const { width, height, density } = await sharp(path.join(out, "figure.png")).metadata()
    expect([width, height, density]).toEqual([1016, 709, 300])
    expect(readFileSync(path.join(out, "figure.svg"), "utf8")).toContain('width="86mm" height="60mm"')
  })

  test("tells every place that is wrong in a problem document and writes nothing", () => {
    const out = path.join(folder, "unmade")
    const spec = file("bad.json", {
      version: 1,
      panels: [
        { ...panel, fit: { window: [9, 3] }, colour: "red" },
        {
          ...panel,
          data: { dataset: "small", columns: { trajectory: "trajectory", time: "tau", observable: "rho" } },
        },
      ],
    })
    const { status, document } = figure(
      "--spec",
      spec,
      "--data",
      `small=${reference("small_ensemble.csv")}`,
      "--out",
      out,
    )
    expect(status).not.toBe(0)
    expect(document).toMatchObject({ code: "invalid-figure-spec", status: 422 })
    expect(Object.keys(document)).toEqual(expect.arrayContaining(["type", "title", "status", "detail"]))
    expect(document.errors.map((error: { pointer: string }) => error.pointer).sort()).toEqual([
      "/panels/0/colour",
      "/panels/0/fit/window",
    ])
    expect(existsSync(out)).toBe(false)
  })

  test("names columns that a table does not have", () => {
    const spec = file("columns.json", {
      version: 1,
      panels: [{ ...panel, data: { dataset: "small", columns: { time: "tau", observable: "rho" } } }],
    })
    const { status, document } = figure(
      "--spec",
      spec,
      "--data",
      `small=${reference("small_ensemble.csv")}`,
      "--out",
      path.join(folder, "unmade"),
    )
    expect(status).toBe(1)
    expect(document.errors.map((error: { pointer: string }) => error.pointer)).toEqual([
      "/panels/0/data/columns/time",
      "/panels/0/data/columns/observable",
    ])
  })

  test("a cell that is no number stops it with its line, unless losses are accepted", async () => {
    const rows = Array.from({ length: 40 }, (_, k) => `${k + 1},${(1 / (k + 1)).toFixed(6)}`)
    rows[16] = "17,1.2.3"
    const data = { name: "small", path: file("cells.csv", `t,n\n${rows.join("\n")}\n`), recipe: null }
    const told: string[] = []
    // The header is line 1, so row 17 is line 18.
    await expect(readData(data, false, (line) => told.push(line))).rejects.toMatchObject({
      code: "unreadable-table",
      errors: [{ pointer: "/data/small", code: "not-a-number", message: expect.stringContaining("Line 18") }],
    })
    const table = await readData(data, true, (line) => told.push(line))
    expect(table.rows).toBe(40)
    expect(table.columns[1]!.values[16]).toBeNaN()
    expect(told).toEqual([expect.stringContaining("Line 18")])
  })

  test("wrong use is a problem document too", () => {
    const { status, document } = figure("--spec", "/nowhere.json", "--out", path.join(folder, "unmade"))
    expect(status).toBe(1)
    expect(document.code).toBe("not-found")
  })
})
