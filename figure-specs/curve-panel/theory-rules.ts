import type { Quantity } from "@/lib/domain/quantity"
import type { PlottedRule } from "./curve-panel"

/** Values of theory that named quantities are compared with, each once, as lines across the frame. */
export function theoryRules(quantities: readonly Quantity[], axis: "x" | "y"): readonly PlottedRule[] {
  const rules = new Map<number, PlottedRule>()
  for (const { theory } of quantities)
    if (theory) rules.set(theory.value, { axis, from: theory.value, label: theory.label ?? null })
  return [...rules.values()]
}
