import { z } from "zod"
import { panelBase } from "../schema/panel-base"
import { fitWindow, label, referenceSlope } from "../schema/panel-parts"

export const timeLaws = ["power", "exponential", "activated"] as const

export const characteristicTimeParams = z
  .object({
    kind: z.literal("characteristic-time"),
    ...panelBase,
    reduction: z
      .object({ uncertainty: z.enum(["standard-error", "none"]).default("standard-error") })
      .strict()
      .prefault({}),
    fit: z
      .object({
        /** Values of the control parameter that are fitted. */
        window: fitWindow.default([null, null]),
        /** Laws that are compared; the first is drawn solid unless `shown` says otherwise. */
        laws: z
          .array(z.enum(timeLaws))
          .min(1)
          .max(3)
          .default(["power", "exponential"])
          .refine((laws) => new Set(laws).size === laws.length, { message: "Name each law once." }),
        /** The law that is drawn solid and quoted first: the best of those compared, or one of them. */
        shown: z.enum(["best", ...timeLaws]).default("best"),
        level: z.number().gt(0).lt(1).default(0.95),
        band: z.enum(["pointwise", "none"]).default("pointwise"),
      })
      .strict()
      .refine(({ laws, shown }) => shown === "best" || laws.includes(shown), {
        message: "The law that is shown is one of those compared.",
        path: ["shown"],
      })
      .nullable()
      .prefault({}),
    references: z.array(referenceSlope).max(6).default([]),
    /** What the time is called, in the alternative text and in the caption. */
    timeName: label.default("characteristic time"),
  })
  .strict()

export type CharacteristicTimeParams = z.infer<typeof characteristicTimeParams>
export type TimeLawName = (typeof timeLaws)[number]
