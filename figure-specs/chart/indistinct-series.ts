import type { LegendEntry } from "./drawing"

/**
 * Pairs of series that only their colour tells apart: the same marker and the same dash. A reader without colour vision,
 * or with a black-and-white print, cannot follow them.
 *
 * @see WCAG 2.2, success criterion 1.4.1
 */
export function indistinctSeries(
  entries: readonly LegendEntry[],
): readonly (readonly [LegendEntry, LegendEntry])[] {
  const carrier = ({ marker, dash }: LegendEntry) => JSON.stringify([marker, dash])
  return entries.flatMap((entry, index) =>
    entries
      .slice(index + 1)
      .filter((other) => carrier(other) === carrier(entry))
      .map((other) => [entry, other] as const),
  )
}
