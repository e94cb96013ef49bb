import { prepareCurves, type PreparedCurves } from "../ensemble/prepare-curves"
import type { PanelInput } from "../figure-kind"
import type { DecayExponentParams } from "./params"

/** What of the parameters the prepared curves depend on; while it stays the same they can be kept. */
export const preparedFrom = ({ data, reduction, fit }: DecayExponentParams) => ({
  data,
  reduction,
  interval: fit?.interval ?? null,
})

/**
 * The part of a decay panel that does not depend on the fit window.
 *
 * @throws SpecError with pointers relative to the panel
 */
export function prepareDecay(
  input: PanelInput,
  params: DecayExponentParams,
  onProgress?: (done: number, total: number) => void,
): PreparedCurves {
  const { interval, ...wish } = preparedFrom(params)
  return prepareCurves(input, wish, interval, onProgress)
}
