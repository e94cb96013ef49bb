import { z } from "zod"
import { markerNames, type Look } from "./drawing"

const points = (least: number, most: number) => z.number().min(least).max(most)
const hexColor = z.string().regex(/^#[0-9a-fA-F]{6}$/, "A colour is written #rrggbb.")

/**
 * Everything about a look that a manuscript or a panel may set, and nothing else: plain numbers, names from lists and
 * colours, so that no setting can carry an expression, an address or markup into a drawing. null takes a setting back.
 */
export const lookPatch = z
  .object({
    fontFamily: z.enum(["Arimo", "STIX Two Text"]).nullable(),
    fontPt: points(4, 24).nullable(),
    smallPt: points(4, 24).nullable(),
    frameWidthPt: points(0.1, 4).nullable(),
    curveWidthPt: points(0.1, 6).nullable(),
    errorWidthPt: points(0.1, 4).nullable(),
    markerSizePt: points(0.5, 12).nullable(),
    tickLengthPt: points(0, 12).nullable(),
    minorTickLengthPt: points(0, 12).nullable(),
    labelGapPt: points(2, 80).nullable(),
    palette: z.array(hexColor).min(1).max(16).nullable(),
    markers: z.array(z.enum(markerNames)).min(1).max(16).nullable(),
    dashes: z
      .array(z.array(points(0.1, 40)).max(8))
      .min(1)
      .max(16)
      .nullable(),
    letter: z
      .object({ style: z.enum(["(a)", "a", "A"]), bold: z.boolean() })
      .partial()
      .strict()
      .nullable(),
    colorMap: z.enum(["viridis", "cividis", "RdBu"]).nullable(),
  })
  .partial()
  .strict()

export type LookPatch = z.infer<typeof lookPatch>

/** A look with a checked patch applied. @see RFC 7396 */
export function patchLook(look: Look, { letter, ...patch }: LookPatch): Look {
  const set = Object.fromEntries(Object.entries(patch).filter(([, value]) => value != null))
  const letters = Object.fromEntries(Object.entries(letter ?? {}).filter(([, value]) => value !== undefined))
  return { ...look, ...set, letter: { ...look.letter, ...letters } }
}
