import { z } from "zod"
import { decayExponentParams } from "./decay-exponent/params"

/** Every kind's parameters, told apart by `kind`. */
export const panelParams = z.discriminatedUnion("kind", [decayExponentParams])
export type PanelParams = z.infer<typeof panelParams>
