/** Words for the distance of an estimate from a value of theory. */
export type TheoryWords = "consistent at this precision" | "tension" | "disagrees within this window"

/**
 * Distance of an estimate from theory in standard errors: up to 2 consistent, up to 3 tension.
 *
 * An exact exponent holds asymptotically; a finite window can disagree for reasons that are physics, not error.
 */
export function compareWithTheory(
  value: number,
  standardError: number,
  theory: number,
): { readonly standardErrors: number; readonly words: TheoryWords } {
  const standardErrors = (value - theory) / standardError
  const distance = Math.abs(standardErrors)
  return {
    standardErrors,
    words:
      distance <= 2
        ? "consistent at this precision"
        : distance <= 3
          ? "tension"
          : "disagrees within this window",
  }
}
