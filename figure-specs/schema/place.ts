import { z } from "zod"

/** Place of a panel in the figure's grid, counted from 1. */
const gridPlace = z
  .object({
    row: z.int().min(1).max(12),
    column: z.int().min(1).max(12),
    rowSpan: z.int().min(1).max(12).default(1),
    columnSpan: z.int().min(1).max(12).default(1),
  })
  .strict()
export type GridPlace = z.infer<typeof gridPlace>

const share = z.number().min(0).max(1)

/**
 * Place of an inset: a box in the frame of another panel that holds the inset with its numbers and titles, in shares of
 * that frame from its lower left corner.
 */
const insetPlace = z
  .object({
    /** Number of the panel that it stands in, counted from 1 as the spec lists them. */
    inside: z.int().min(1).max(24),
    x: share,
    y: share,
    width: z.number().min(0.1).max(1),
    height: z.number().min(0.1).max(1),
  })
  .strict()
  .refine(({ x, y, width, height }) => x + width <= 1.000001 && y + height <= 1.000001, {
    message: "An inset has to lie inside the frame of its panel.",
  })
export type InsetPlace = z.infer<typeof insetPlace>

/** Where a panel stands: in the grid, or inside another panel. */
export const panelPlace = z.union([gridPlace, insetPlace])
