import { exponential, exponentialOffset, stretchedExponential } from "./exponentials"
import type { Law, LawId } from "./law"
import { finiteTimeDivergence, powerLaw, powerLawOffset } from "./power-laws"
import { straightLine } from "./straight-line"

/** Every law an ensemble mean can be fitted with. @see docs/methods.md, laws */
export const laws: Readonly<Record<LawId, Law>> = {
  "straight-line": straightLine,
  "power-law": powerLaw,
  "power-law-offset": powerLawOffset,
  exponential,
  "exponential-offset": exponentialOffset,
  "stretched-exponential": stretchedExponential,
  "finite-time-divergence": finiteTimeDivergence,
}
