import type { FigureSpecInput } from "../../figure-specs/figure-spec"
import { simulatedTables, tableCsv, type SimulationName } from "../simulate/simulated-tables"

export interface DemoContent {
  readonly manuscript: { readonly title: string; readonly abstract: string }
  readonly datasets: readonly {
    readonly name: string
    readonly fileName: string
    readonly csv: () => string
  }[]
  readonly figures: readonly {
    readonly name: string
    readonly title: string
    readonly caption: string
    /** Earliest first; `by` counts the demo's people. */
    readonly versions: readonly {
      readonly by: number
      readonly message: string
      readonly spec: FigureSpecInput
    }[]
    readonly threads: readonly {
      /** Number of the version. */
      readonly on: number
      readonly anchor: { readonly x: number; readonly y: number } | null
      readonly mustSettle: boolean
      readonly resolvedBy: number | null
      readonly comments: readonly { readonly by: number; readonly body: string }[]
    }[]
    /** Number of the version that the open draft pins, or null. */
    readonly pinned: number | null
  }[]
}

const table = (name: SimulationName) => () => tableCsv(simulatedTables[name]())

const decay = (window: [number, number], bins: number, title: string): FigureSpecInput => ({
  version: 1,
  title,
  size: { widthMm: 86, heightMm: 66 },
  panels: [
    {
      kind: "decay-exponent",
      data: {
        dataset: "annihilation",
        columns: { trajectory: "run", time: "t", observable: "n" },
        curveBy: "gamma",
      },
      reduction: { bins: { perDecade: bins } },
      fit: { window, interval: { method: "jackknife-t", level: 0.95 }, band: { kind: "simultaneous" } },
      references: [{ exponent: -0.5, label: "$t^{-1/2}$" }],
      axes: { x: { label: "$t\\,[1/J]$" }, y: { label: "$\\langle n(t)\\rangle$" } },
      quantities: [
        { name: "alphaSlow", of: "exponent", curve: 0.5, theory: { value: -0.5, label: "diffusive" } },
        { name: "alphaMid", of: "exponent", curve: 1, theory: { value: -0.5, label: "diffusive" } },
        { name: "alphaFast", of: "exponent", curve: 2, theory: { value: -0.5, label: "diffusive" } },
      ],
    },
  ],
})

const growth: FigureSpecInput = {
  version: 1,
  title: "Roughening of the interface",
  size: { widthMm: 86, heightMm: 66 },
  panels: [
    {
      kind: "decay-exponent",
      data: {
        dataset: "growth",
        columns: { trajectory: "run", time: "t", observable: "w2" },
        where: [{ column: "L", equals: 2048 }],
      },
      reduction: { bins: { perDecade: 8 } },
      fit: { window: [30, null] },
      references: [{ exponent: 2 / 3, label: "$t^{2/3}$" }],
      axes: { y: { label: "$\\langle w^2(t)\\rangle$" } },
      quantities: [{ name: "twoBeta", of: "exponent", theory: { value: 2 / 3, label: "KPZ" } }],
    },
  ],
}

/** What the demo manuscript holds. Every exponent in it has an exact value known from the literature. */
export const demoContent: DemoContent = {
  manuscript: {
    title: "Slow decay and rough fronts in a driven lattice gas",
    abstract:
      "After a quench, walkers that annihilate in pairs on a ring thin out as the inverse square root of time. We measure the decay for three hop rates and compare it with the exact law.",
  },
  datasets: [
    { name: "annihilation", fileName: "annihilation.csv", csv: table("annihilation") },
    { name: "growth", fileName: "growth.csv", csv: table("growth") },
    { name: "front", fileName: "front.csv", csv: table("front") },
  ],
  figures: [
    {
      name: "density-decay",
      title: "Decay of the density after the quench",
      caption:
        "Density of walkers after a quench from the full ring, for three hop rates $\\gamma$. Lines: power laws fitted inside the window; dashed: their continuation.",
      versions: [
        { by: 1, message: "First look, window from 5", spec: decay([5, 2000], 8, "Density decay") },
        {
          by: 0,
          message: "Later window: the start felt the lattice",
          spec: decay([30, 2000], 12, "Density decay"),
        },
      ],
      threads: [
        {
          on: 1,
          anchor: { x: 38, y: 46 },
          mustSettle: false,
          resolvedBy: 0,
          comments: [
            { by: 0, body: "The window starts where the curve still bends. Can we begin at 30?" },
            {
              by: 1,
              body: "Yes. The exponent moves by less than its error, but the drift warning goes away.",
            },
          ],
        },
        {
          on: 2,
          anchor: { x: 70, y: 62 },
          mustSettle: true,
          resolvedBy: null,
          comments: [
            { by: 2, body: "Should the caption say that the band is simultaneous? A referee will ask." },
            { by: 1, body: "The statistics sentence says it; I would leave it there." },
          ],
        },
      ],
      pinned: 2,
    },
    {
      name: "width-growth",
      title: "Roughening of the interface",
      caption:
        "Squared width of the growing interface on a ring of 2048 sites, so large that its size is not felt. The exponent of $w^2$ is $2\\beta$.",
      versions: [{ by: 1, message: "Largest ring only", spec: growth }],
      threads: [],
      pinned: 1,
    },
  ],
}
