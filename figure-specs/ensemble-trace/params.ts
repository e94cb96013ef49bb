import { z } from "zod"
import { panelBase } from "../schema/panel-base"
import { fitWindow, reductionParams } from "../schema/panel-parts"

const level = z.number().gt(0).lt(1).default(0.95)

export const ensembleTraceParams = z
  .object({
    kind: z.literal("ensemble-trace"),
    ...panelBase,
    reduction: reductionParams.prefault({}),
    /** Band of the mean at each time, by Student's t over trajectories. */
    band: z
      .object({ kind: z.enum(["pointwise", "none"]).default("pointwise"), level })
      .strict()
      .prefault({}),
    /** Window over which the curve counts as saturated; null for none. */
    saturation: z
      .object({ window: fitWindow.default([null, null]), level })
      .strict()
      .nullable()
      .default(null),
  })
  .strict()

export type EnsembleTraceParams = z.infer<typeof ensembleTraceParams>
