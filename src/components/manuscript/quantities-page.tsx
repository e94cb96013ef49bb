import { HeatMark } from "@/components/parts/heat"
import { Ledger } from "@/components/parts/ledger"
import { intervalText, QuantityView } from "@/components/parts/quantity-view"
import type { Quantity } from "@/lib/domain/quantity"

export interface ListedQuantity {
  readonly quantity: Quantity
  readonly figure: string
  readonly version: number
  readonly address: string
  readonly isPinned: boolean
}

/** Every named number of the manuscript's figures, as the text will quote it, and the macros for it. */
export function QuantitiesPage({
  quantities,
  valuesTex,
  problem,
}: {
  quantities: readonly ListedQuantity[]
  valuesTex: string
  problem: string | null
}) {
  return (
    <div className="sheet">
      <div className="across min-w-0">
        <h1 className="mt-0 mb-4 text-title">Quantities</h1>
        <Ledger
          caption="Named quantities of the figures"
          rows={quantities}
          rowKey={(row) => `${row.figure}-${row.quantity.name}`}
          empty={
            <p className="measure font-serif">
              No figure names a quantity yet. In a figure’s spec, <code>quantities</code> gives a number a
              name that the text can use as a macro.
            </p>
          }
          columns={[
            { key: "name", heading: "Name", cell: (row) => <code>\{row.quantity.name}</code> },
            { key: "value", heading: "Value", cell: (row) => <QuantityView quantity={row.quantity} /> },
            {
              key: "interval",
              heading: "Interval",
              wideOnly: true,
              cell: (row) => intervalText(row.quantity) ?? "none",
            },
            {
              key: "theory",
              heading: "Against theory",
              wideOnly: true,
              cell: ({ quantity: { theory } }) =>
                theory
                  ? `${String(theory.value).replace("-", "−")}${theory.label ? ` (${theory.label})` : ""}: ${theory.standardErrors.toFixed(1).replace("-", "−")} SE, ${theory.words}`
                  : "",
            },
            {
              key: "figure",
              heading: "From",
              cell: (row) => (
                <a href={row.address}>
                  {row.figure}, version {row.version}
                </a>
              ),
            },
            {
              key: "state",
              heading: "State",
              wideOnly: true,
              cell: (row) =>
                row.isPinned ? (
                  <HeatMark heat="settled">pinned</HeatMark>
                ) : (
                  <HeatMark heat="proposed">not pinned</HeatMark>
                ),
            },
          ]}
        />
        {quantities.length > 0 && (
          <section className="mt-8">
            <h2 className="m-0 text-lead">values.tex</h2>
            {problem ? (
              <p className="text-wrong-ink">{problem}</p>
            ) : (
              <>
                <pre
                  // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex -- a scrolling region must be reachable by keyboard
                  tabIndex={0}
                  aria-label="values.tex"
                  className="overflow-x-auto bg-sunk p-3 text-small leading-5"
                >
                  {valuesTex}
                </pre>
                <a
                  href={`data:application/x-tex;charset=utf-8,${encodeURIComponent(valuesTex)}`}
                  download="values.tex"
                >
                  Download values.tex
                </a>
              </>
            )}
          </section>
        )}
      </div>
    </div>
  )
}
