import { z } from "zod"
import { panelBase } from "../schema/panel-base"
import { bandParams, fitWindow, intervalParams, reductionParams, referenceSlope } from "../schema/panel-parts"

/** The power-law fit of one decay panel. */
const decayFit = z
  .object({
    model: z.literal("power-law").default("power-law"),
    window: fitWindow.default([null, null]),
    weights: z.enum(["smoothed", "inverse-variance", "equal"]).default("smoothed"),
    interval: intervalParams.prefault({}),
    band: bandParams.prefault({}),
  })
  .strict()

export const decayExponentParams = z
  .object({
    kind: z.literal("decay-exponent"),
    ...panelBase,
    reduction: reductionParams.prefault({}),
    fit: decayFit.nullable().prefault({}),
    references: z.array(referenceSlope).max(6).default([]),
  })
  .strict()

export type DecayExponentParams = z.infer<typeof decayExponentParams>
