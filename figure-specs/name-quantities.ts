import type { Quantity } from "@/lib/domain/quantity"
import { compareWithTheory } from "@/lib/stats/power-law/compare-with-theory"
import type { CurveResult } from "./figure-kind"
import type { NamedQuantity } from "./schema/panel-parts"
import { SpecError, type SpecIssue } from "./spec-error"

/**
 * The named quantities of a panel: each a copy of a curve's quantity under its own name, compared with theory where the
 * spec gives a value.
 *
 * @throws SpecError quantity-unknown, quantity-repeated, with pointers relative to the panel
 */
export function nameQuantities(
  names: readonly NamedQuantity[],
  curves: readonly CurveResult[],
  offered: readonly string[],
): readonly Quantity[] {
  const issues: SpecIssue[] = []
  const seen = new Set<string>()
  const quantities = names.flatMap((named, index) => {
    const pointer = `/quantities/${index}`
    if (seen.has(named.name))
      issues.push({
        pointer: `${pointer}/name`,
        code: "quantity-repeated",
        message: `Two quantities are called ${named.name}.`,
      })
    seen.add(named.name)
    const curve =
      curves.length === 1 && named.curve === null ? curves[0] : curves.find((c) => c.curve === named.curve)
    if (!curve) {
      const known = curves.map((c) => String(c.curve)).join(", ")
      issues.push({
        pointer: `${pointer}/curve`,
        code: "quantity-unknown",
        message: `There is no curve ${named.curve}; the curves are ${known}.`,
      })
      return []
    }
    if (!offered.includes(named.of)) {
      issues.push({
        pointer: `${pointer}/of`,
        code: "quantity-unknown",
        message: `This kind yields no “${named.of}”; it yields ${offered.join(", ")}.`,
      })
      return []
    }
    // A curve whose fit was refused has no quantity: its warning says why.
    const found = curve.quantities.find((quantity) => quantity.name === named.of)
    return found ? [{ ...found, name: named.name, ...theoryOf(found, named) }] : []
  })
  if (issues.length > 0) throw new SpecError(issues)
  return quantities
}

function theoryOf(quantity: Quantity, { theory }: NamedQuantity): Pick<Quantity, "theory"> | object {
  if (!theory || quantity.standardError === null) return {}
  return { theory: { ...theory, ...compareWithTheory(quantity.value, quantity.standardError, theory.value) } }
}
