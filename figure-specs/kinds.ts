import { characteristicTime } from "./characteristic-time"
import { decayExponent } from "./decay-exponent"
import { ensembleTrace } from "./ensemble-trace"
import { finiteTimeDivergence } from "./finite-time-divergence"
import type { FigureKind, PanelResult } from "./figure-kind"
import type { PanelParams } from "./registry"

/** Every kind with all that it can do; registry.ts holds their parameters alone, which is all that a schema needs. */
const kinds = {
  "decay-exponent": decayExponent,
  "ensemble-trace": ensembleTrace,
  "characteristic-time": characteristicTime,
  "finite-time-divergence": finiteTimeDivergence,
} satisfies Record<PanelParams["kind"], object>

export type KindName = keyof typeof kinds

/** A kind as the code that treats all kinds alike sees it. */
export type AnyKind = FigureKind<PanelParams, PanelResult>

/** The kind of a panel; the schema has already made sure that there is one. */
export function kindOf(kind: PanelParams["kind"]): AnyKind {
  // A kind's own result type is narrower than PanelResult; results reach a kind only if it made them.
  return kinds[kind] as unknown as AnyKind
}

/** All kinds, in the order in which they are offered. */
export function listKinds(): readonly AnyKind[] {
  return Object.values(kinds) as unknown as readonly AnyKind[]
}
