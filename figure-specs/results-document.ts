import type { Quantity } from "@/lib/domain/quantity"
import type { CurveKey, PanelResult } from "./figure-kind"
import type { FigureResults } from "./compute-figure"

/** The results of a figure as they are published: numbers, intervals and warnings, without the drawn points. */
export interface ResultsDocument {
  readonly panels: readonly {
    readonly kind: string
    readonly curves: readonly { readonly curve: CurveKey; readonly quantities: readonly Quantity[] }[]
    readonly quantities: readonly Quantity[]
    readonly warnings: readonly {
      readonly code: string
      readonly severity: string
      readonly message: string
      readonly where: string
    }[]
  }[]
}

const panelDocument = ({
  kind,
  curves,
  quantities,
  warnings,
}: PanelResult): ResultsDocument["panels"][number] => ({
  kind,
  curves: curves.map((curve) => ({ curve: curve.curve, quantities: curve.quantities })),
  quantities,
  warnings,
})

/** results.json of a figure. */
export function resultsDocument(results: FigureResults): ResultsDocument {
  return { panels: results.panels.map(panelDocument) }
}
