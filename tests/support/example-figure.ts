import { handMadeResult } from "@tests/support/hand-made-result"
import { figureSpec, type FigureSpecInput } from "@specs/figure-spec"

/** A decay panel as a spec says it, with changes. */
export const decayPanel = (changes: object = {}) =>
  ({
    kind: "decay-exponent",
    data: { dataset: "annihilation", columns: { trajectory: "run", time: "t", observable: "n" } },
    ...changes,
  }) as FigureSpecInput["panels"][number]

/** A figure of two panels beside each other with results made by hand. */
export function exampleFigure(changes: Partial<FigureSpecInput> = {}) {
  const spec = figureSpec.parse({
    version: 1,
    title: "Density decay",
    size: { widthMm: 178, heightMm: 64 },
    grid: { rows: 1, columns: 2 },
    panels: [
      decayPanel({ references: [{ exponent: -0.5 }], title: "one rate" }),
      decayPanel({ place: { row: 1, column: 2 }, axes: { x: { label: "Time $t\\,[1/J]$" }, y: {} } }),
    ],
    ...changes,
  })
  return { spec, results: [handMadeResult(1), handMadeResult(3)] }
}
