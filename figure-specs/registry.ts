import { z } from "zod"
import { decayExponentParams } from "./decay-exponent/params"
import { ensembleTraceParams } from "./ensemble-trace/params"
import { finiteTimeDivergenceParams } from "./finite-time-divergence/params"

/** Every kind's parameters, told apart by `kind`. */
export const panelParams = z.discriminatedUnion("kind", [
  decayExponentParams,
  ensembleTraceParams,
  finiteTimeDivergenceParams,
])
export type PanelParams = z.infer<typeof panelParams>
