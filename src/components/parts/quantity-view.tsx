import { useId, useState } from "react"
import type { Quantity } from "@/lib/domain/quantity"
import { MathText } from "./math-text"

/** The number as a person writes it; 0.587(12), with the minus sign of mathematics. */
export const quantityText = (quantity: Quantity): string => quantity.text.replaceAll("-", "−")

/** 95 % [0.563, 0.611] */
export function intervalText(quantity: Quantity): string | null {
  const { interval } = quantity
  if (!interval) return null
  const digits = decimalsOf(quantity.text) + 1
  const end = (x: number) => x.toFixed(Math.min(digits, 12)).replace("-", "−")
  return `${Number((interval.level * 100).toPrecision(4))} % [${end(interval.low)}, ${end(interval.high)}]`
}

const decimalsOf = (text: string): number => /\.(\d+)/.exec(text)?.[1]?.length ?? 0

/** Symbol = value(uncertainty) unit; opens to how the number was made, in the words of a methods section. */
export function QuantityView({
  quantity,
  symbol,
  unit,
}: {
  quantity: Quantity
  symbol?: string | null
  unit?: string | null
}) {
  const [isOpen, setOpen] = useState(false)
  const id = useId()
  const { provenance } = quantity
  const facts: readonly [string, string | null][] = provenance
    ? [
        ["Estimator", provenance.estimator],
        ["Weights", provenance.weights ?? null],
        [
          "Window",
          provenance.window
            ? `${provenance.window.map((end) => Number(end.toPrecision(4))).join(" to ")}${provenance.decades ? ` (${provenance.decades.toFixed(2)} decades)` : ""}`
            : null,
        ],
        ["Trajectories", provenance.trajectories ? String(provenance.trajectories) : null],
        ["Points", provenance.points ? String(provenance.points) : null],
        ["Degrees of freedom", provenance.degreesOfFreedom ? String(provenance.degreesOfFreedom) : null],
        ["Resamples", provenance.resamples ? `${provenance.resamples}, seed ${provenance.seed}` : null],
        ["Interval", quantity.interval ? `${intervalText(quantity)}, ${quantity.interval.type}` : null],
        ["Standard error", quantity.standardError === null ? null : quantity.standardError.toPrecision(4)],
      ]
    : []
  return (
    <span className="inline-block">
      <button
        type="button"
        aria-expanded={isOpen}
        aria-controls={`${id}-made`}
        onClick={() => setOpen(!isOpen)}
        className="min-h-6 font-serif tabular-nums underline decoration-rule decoration-dotted underline-offset-4 hover:decoration-solid"
      >
        {symbol && (
          <>
            <MathText text={symbol} /> ={" "}
          </>
        )}
        {quantityText(quantity)}
        {unit && <> {unit}</>}
      </button>
      {isOpen && (
        <span
          id={`${id}-made`}
          className="mt-1 mb-2 block max-w-prose border-l-2 border-rule bg-raised py-2 pr-3 pl-3 font-sans text-small"
        >
          {provenance?.sentence && <span className="mb-2 block font-serif">{provenance.sentence}</span>}
          {facts
            .filter(([, value]) => value !== null)
            .map(([name, value]) => (
              <span key={name} className="block">
                <span className="text-soft">{name}:</span> {value}
              </span>
            ))}
          {!provenance && <span className="block">No further record of how it was made.</span>}
        </span>
      )}
    </span>
  )
}
