import { z } from "zod"
import { dataBinding } from "../schema/data-binding"
import {
  axes,
  bandParams,
  fitWindow,
  intervalParams,
  label,
  namedQuantity,
  place,
  reductionParams,
  referenceSlope,
  stylePatch,
} from "../schema/panel-parts"

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
    place: place.prefault({ row: 1, column: 1 }),
    letter: z.string().max(3).optional(),
    title: label.optional(),
    data: dataBinding,
    reduction: reductionParams.prefault({}),
    fit: decayFit.nullable().prefault({}),
    references: z.array(referenceSlope).max(6).default([]),
    axes: axes.prefault({}),
    quantities: z.array(namedQuantity).max(40).default([]),
    style: stylePatch,
  })
  .strict()

export type DecayExponentParams = z.infer<typeof decayExponentParams>
