import { z } from "zod"
import { characteristicTimeParams } from "./characteristic-time/params"
import { decayExponentParams } from "./decay-exponent/params"
import { ensembleTraceParams } from "./ensemble-trace/params"
import { finiteTimeDivergenceParams } from "./finite-time-divergence/params"

/** Every kind's parameters, told apart by `kind`. */
export const panelParams = z.discriminatedUnion("kind", [
  decayExponentParams,
  ensembleTraceParams,
  characteristicTimeParams,
  finiteTimeDivergenceParams,
])
export type PanelParams = z.infer<typeof panelParams>
