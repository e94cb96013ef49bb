import type { z } from "zod"
import { Ledger } from "@/components/parts/ledger"
import { intervalText, QuantityView } from "@/components/parts/quantity-view"
import type { resultsDocument } from "@/lib/contracts/figures"
import type { Quantity } from "@/lib/domain/quantity"

type Results = z.output<typeof resultsDocument>

interface Row {
  readonly key: string
  readonly where: string
  readonly quantity: Quantity
}

/** Every quantity of a figure; named ones first. */
function rowsOf(results: Results): readonly Row[] {
  return results.panels.flatMap((panel, index) => {
    const prefix = results.panels.length > 1 ? `(${String.fromCharCode(97 + index)}) ` : ""
    const named = panel.quantities.map((quantity) => ({
      key: `${index}-${quantity.name}`,
      where: `${prefix}${quantity.name}`,
      quantity: quantity as Quantity,
    }))
    const curves = panel.curves.flatMap((curve) =>
      curve.quantities.map((quantity) => ({
        key: `${index}-${curve.curve}-${quantity.name}`,
        where: `${prefix}${quantity.name}${curve.curve === null ? "" : `, ${curve.curve}`}`,
        quantity: quantity as Quantity,
      })),
    )
    return [...named, ...curves]
  })
}

/** The numbers of a figure; each opens to how it was made. */
export function ResultsLedger({ results }: { results: Results }) {
  return (
    <Ledger
      caption="Quantities of this figure"
      rows={rowsOf(results)}
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
              ? `${theory.value}${theory.label ? ` (${theory.label})` : ""}: ${theory.standardErrors.toFixed(1).replace("-", "−")} SE, ${theory.words}`
              : "",
        },
      ]}
    />
  )
}
