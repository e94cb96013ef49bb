import { z } from "zod"
import { panelBase } from "../schema/panel-base"
import { fitWindow, lawIntervalParams, reductionParams } from "../schema/panel-parts"

export const finiteTimeDivergenceParams = z
  .object({
    kind: z.literal("finite-time-divergence"),
    ...panelBase,
    reduction: reductionParams.prefault({}),
    fit: z
      .object({
        window: fitWindow.default([null, null]),
        /** Least squares on the values themselves or on their logarithms; auto decides by their significance. */
        scale: z.enum(["auto", "log", "raw"]).default("auto"),
        weights: z.enum(["smoothed", "inverse-variance", "equal"]).default("smoothed"),
        interval: lawIntervalParams("expanded-percentile"),
        band: z.enum(["pointwise", "none"]).default("pointwise"),
      })
      .strict()
      .prefault({}),
  })
  .strict()

export type FiniteTimeDivergenceParams = z.infer<typeof finiteTimeDivergenceParams>
