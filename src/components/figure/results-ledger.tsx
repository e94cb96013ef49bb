import { Ledger } from "@/components/parts/ledger"
import { intervalText, QuantityView } from "@/components/parts/quantity-view"
import type { Quantity } from "@/lib/domain/quantity"

interface Panel {
  readonly curves: readonly {
    readonly curve: number | string | null
    readonly quantities: readonly object[]
  }[]
  readonly quantities: readonly object[]
}

interface Row {
  readonly key: string
  readonly where: string
  readonly quantity: Quantity
}

/** Every quantity of a figure; named ones first. */
function rowsOf(panels: readonly Panel[]): readonly Row[] {
  return panels.flatMap((panel, index) => {
    const prefix = panels.length > 1 ? `(${String.fromCharCode(97 + index)}) ` : ""
    const named = (panel.quantities as readonly Quantity[]).map((quantity) => ({
      key: `${index}-${quantity.name}`,
      where: `${prefix}${quantity.name}`,
      quantity,
    }))
    const curves = panel.curves.flatMap((curve) =>
      (curve.quantities as readonly Quantity[]).map((quantity) => ({
        key: `${index}-${curve.curve}-${quantity.name}`,
        where: `${prefix}${quantity.name}${curve.curve === null ? "" : `, ${curve.curve}`}`,
        quantity,
      })),
    )
    return [...named, ...curves]
  })
}

/** The numbers of a figure; each opens to how it was made. */
export function ResultsLedger({ panels }: { panels: readonly Panel[] }) {
  return (
    <Ledger
      caption="Quantities of this figure"
      rows={rowsOf(panels)}
      rowKey={(row) => row.key}
      empty={
        <p className="text-soft">This figure yields no quantity: its fit was refused, or it has none.</p>
      }
      columns={[
        { key: "where", heading: "Quantity", cell: (row) => row.where },
        { key: "value", heading: "Value", cell: (row) => <QuantityView quantity={row.quantity} /> },
        {
          key: "interval",
          heading: "Interval",
          wideOnly: true,
          cell: (row) => intervalText(row.quantity) ?? "none",
        },
        {
          key: "theory",
          heading: "Theory",
          wideOnly: true,
          cell: ({ quantity: { theory } }) =>
            theory
              ? `${String(theory.value).replace("-", "−")}${theory.label ? ` (${theory.label})` : ""}: ${theory.standardErrors.toFixed(1).replace("-", "−")} SE, ${theory.words}`
              : "",
        },
      ]}
    />
  )
}
