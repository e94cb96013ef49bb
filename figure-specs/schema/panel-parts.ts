import { z } from "zod"
import { lookPatch } from "../chart/look-patch"

/** A label: text with TeX between dollar signs. Control characters are refused because the typesetter uses two of them. */
export const label = z
  .string()
  .max(500)
  .refine((text) => !/[\u0000-\u001f\u007f]/.test(text), {
    message: "A label may not hold control characters.",
  })

/** Identifier of a quantity, usable as a TeX macro: letters only. */
export const quantityName = z
  .string()
  .regex(/^[A-Za-z]{1,40}$/, "A quantity's name is letters only, so that it can be a TeX macro.")

const axis = z
  .object({
    label: label.optional(),
    scale: z.enum(["log", "linear"]).optional(),
    domain: z
      .tuple([z.number(), z.number()])
      .refine(([low, high]) => low < high, { message: "A domain runs from the lower to the higher value." })
      .optional(),
  })
  .strict()
export type AxisParams = z.infer<typeof axis>

export const axes = z.object({ x: axis.prefault({}), y: axis.prefault({}) }).strict()

/** A straight line of given exponent, drawn as a guide, not a fit. */
export const referenceSlope = z
  .object({ exponent: z.number().min(-20).max(20), label: label.optional() })
  .strict()

/** Names one of the numbers that the panel yields, so that text and captions can use it. */
export const namedQuantity = z
  .object({
    name: quantityName,
    of: z.string().min(1).max(60),
    curve: z.union([z.number(), z.string()]).nullable().default(null),
    theory: z.object({ value: z.number(), label: label.optional() }).strict().optional(),
  })
  .strict()
export type NamedQuantity = z.infer<typeof namedQuantity>

/** Closed interval of the abscissa that a fit uses; null leaves that side at the end of the data. */
export const fitWindow = z
  .tuple([z.number().nullable(), z.number().nullable()])
  .refine(([low, high]) => low === null || high === null || low < high, {
    message: "A fit window runs from the lower to the higher abscissa.",
  })

/** How an uncertainty is turned into an interval; docs/methods.md says which to use when. */
export const intervalParams = z
  .object({
    method: z
      .enum(["jackknife-t", "expanded-percentile", "bca", "percentile", "basic"])
      .default("jackknife-t"),
    level: z.number().gt(0).lt(1).default(0.95),
    resamples: z.int().min(100).max(20000).default(2000),
    seed: z.int().min(0).max(Number.MAX_SAFE_INTEGER).default(1),
  })
  .strict()
export type IntervalParams = z.infer<typeof intervalParams>

/**
 * The interval of a law's parameters: symmetric from deletions, or with its own two sides from resamples.
 *
 * @param method the default
 */
export const lawIntervalParams = (method: "jackknife-t" | "expanded-percentile") =>
  z
    .object({
      method: z.enum(["jackknife-t", "expanded-percentile"]).default(method),
      level: z.number().gt(0).lt(1).default(0.95),
      resamples: z.int().min(100).max(20000).default(1000),
      seed: z.int().min(0).max(Number.MAX_SAFE_INTEGER).default(1),
    })
    .strict()
    .prefault({})
export type LawIntervalParams = z.infer<ReturnType<typeof lawIntervalParams>>

export const bandParams = z
  .object({
    kind: z.enum(["pointwise", "simultaneous", "none"]).default("pointwise"),
    level: z.number().gt(0).lt(1).default(0.95),
    resamples: z.int().min(100).max(20000).default(2000),
    seed: z.int().min(0).max(Number.MAX_SAFE_INTEGER).default(1),
  })
  .strict()
export type BandParams = z.infer<typeof bandParams>

/** Table to ensemble: what is averaged, how its error is taken, how times are grouped. */
export const reductionParams = z
  .object({
    estimator: z.literal("mean").default("mean"),
    uncertainty: z.enum(["standard-error", "none"]).default("standard-error"),
    bins: z
      .object({ perDecade: z.int().min(3).max(30) })
      .strict()
      .nullable()
      .default(null),
    normalise: z
      .union([
        z.enum(["none", "initial"]),
        z.object({ constant: z.number().refine((c) => c !== 0, { message: "Dividing by zero." }) }).strict(),
      ])
      .default("none"),
    unequalGrids: z.enum(["refuse", "inner-join"]).default("refuse"),
  })
  .strict()
export type ReductionParams = z.infer<typeof reductionParams>

/** RFC 7396 merge patch on the look of the figure, for one panel. */
export const stylePatch = lookPatch.default({})
