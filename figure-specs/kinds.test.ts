import { existsSync, readdirSync, readFileSync } from "node:fs"
import { describe, expect, test } from "vitest"
import { withValueAt } from "@/lib/domain/json-pointer"
import { asDataTable, simulatedTables, type SimulationName } from "../scripts/simulate/simulated-tables"
import { defaultLook } from "./chart/look"
import { computeFigure, datasetsOf } from "./compute-figure"
import { drawPanel } from "./draw-panel"
import type { DataTable, Sentence } from "./figure-kind"
import { figureSpec, type FigureSpec } from "./figure-spec"
import { kindOf, listKinds } from "./kinds"
import { issuesOf } from "./read-spec"
import { panelParams, type PanelParams } from "./registry"

const here = new URL(".", import.meta.url)

/** The demo's tables with a tenth of their trajectories: enough to compute with. */
const tables = new Map<string, DataTable>()
function tableOf(name: string): DataTable {
  const known = tables.get(name)
  if (known) return known
  const table = asDataTable(simulatedTables[name as SimulationName](0.1))
  tables.set(name, table)
  return table
}

const exampleOf = (kind: string): FigureSpec => {
  const read = figureSpec.safeParse(JSON.parse(readFileSync(new URL(`${kind}/example.json`, here), "utf8")))
  if (!read.success) throw new Error(JSON.stringify(issuesOf(read.error), null, 2))
  return read.data
}
const inputOf = (spec: FigureSpec) => ({
  tables: new Map(datasetsOf(spec).map((name) => [name, tableOf(name)])),
})

/** Roles as intake proposes them for the columns of the demo's tables. */
const roles: Record<string, string> = {
  run: "trajectory",
  t: "time",
  x: "coordinate",
  k: "coordinate",
  gamma: "parameter",
  L: "parameter",
  n: "observable",
  w2: "observable",
  rho: "observable",
  tau_m: "observable",
  S: "observable",
  n_k: "observable",
}

/** What the editor's choice control sends for an option; numbers and null are written as text. */
const fromChoice = (text: string): unknown => (/^(null|-?\d+(\.\d+)?)$/.test(text) ? JSON.parse(text) : text)

type Slot = Extract<Sentence["parts"][number], { type: "slot" }>
function changesOf(slot: Slot): readonly { readonly pointer: string; readonly value: unknown }[] {
  const emptied = slot.whenEmpty
    ? [{ pointer: slot.whenEmpty.pointer, value: slot.whenEmpty.put === "null" ? null : undefined }]
    : []
  const { control, pointer } = slot
  switch (control.type) {
    case "choice":
      return [...emptied, ...control.options.map((option) => ({ pointer, value: fromChoice(option.value) }))]
    case "number":
      return [...emptied, { pointer, value: control.min ?? 1 }]
    case "window":
      return [...emptied, { pointer, value: [1, 2] }]
    case "column":
    case "dataset":
    case "text":
      return [...emptied, { pointer, value: "name" }]
    case "filters":
      return [{ pointer, value: [{ column: "L", equals: 1 }] }]
    case "references":
      return [{ pointer, value: [{ exponent: 0.5 }] }]
  }
}

test("every folder with a kind is registered, and every kind has its folder", () => {
  const folders = readdirSync(here, { withFileTypes: true })
    .filter((entry) => entry.isDirectory() && existsSync(new URL(`${entry.name}/params.ts`, here)))
    .map((entry) => entry.name)
  expect(
    listKinds()
      .map(({ kind }) => kind)
      .sort(),
  ).toEqual(folders.sort())
})

describe.each(listKinds().map(({ kind }) => kind))("%s", (name) => {
  const kind = kindOf(name)
  const spec = exampleOf(name)
  const panel = spec.panels.find((one) => one.kind === name) as PanelParams
  const results = () => computeFigure(spec, inputOf(spec))

  test("its example computes; the result survives JSON and gives what it names", () => {
    const { panels } = results()
    expect(JSON.parse(JSON.stringify(panels))).toEqual(panels)
    const result = panels[spec.panels.indexOf(panel)]!
    expect(result.kind).toBe(name)
    expect(result.series.length).toBeGreaterThan(0)
    for (const series of result.series)
      expect(new Set(series.columns.map(({ values }) => values.length)).size).toBe(1)
    expect(result.quantities.map((quantity) => quantity.name)).toEqual(
      panel.quantities.map((quantity) => quantity.name),
    )
    for (const quantity of [...result.quantities, ...result.curves.flatMap((curve) => curve.quantities)]) {
      expect(quantity.provenance?.sentence).toMatch(/\.$/)
      expect(quantity.text).not.toBe("")
    }
  })

  test("the same input gives the same bytes", () => {
    expect(JSON.stringify(results())).toBe(JSON.stringify(results()))
  })

  test("every slot of its sentence writes a valid spec", () => {
    const { parts, plain } = kind.sentence(panel, results().panels[spec.panels.indexOf(panel)])
    expect(plain).toMatch(/\.$/)
    const slots = parts.filter((part) => part.type === "slot")
    expect(new Set(slots.map(({ id }) => id)).size).toBe(slots.length)
    for (const slot of slots)
      for (const { pointer, value } of changesOf(slot)) {
        const read = panelParams.safeParse(withValueAt(panel, pointer, value))
        expect([slot.id, read.success ? [] : issuesOf(read.error)]).toEqual([slot.id, []])
      }
  })

  test("what it proposes for its own table computes", () => {
    const table = tableOf(panel.data.dataset)
    const given = new Map(table.columns.map((column) => [column.name, roles[column.name] ?? "observable"]))
    const proposed = panelParams.parse(kind.propose(panel.data.dataset, table, given))
    const figure = figureSpec.parse({ version: 1, panels: [proposed] })
    expect(computeFigure(figure, inputOf(figure)).panels[0]!.series.length).toBeGreaterThan(0)
  })

  test("its drawing is plain data and says what it shows", () => {
    const result = results().panels[spec.panels.indexOf(panel)]!
    const drawing = drawPanel(panel, result, { widthPt: 180, heightPt: 130, look: defaultLook })
    expect(JSON.stringify(drawing)).not.toMatch(/NaN|Infinity|undefined|https?:(?!\/\/vega)/)
    expect(drawing.alternativeText.length).toBeGreaterThan(40)
    expect(drawing.spec.marks!.length).toBeGreaterThan(0)
  })
})
