import { z } from "zod"
import { panelParams } from "./registry"
import { label } from "./schema/panel-parts"

const millimetres = z.number().min(10).max(400)

/** Outer size of the printed figure. */
export const figureSize = z
  .object({ widthMm: millimetres, heightMm: millimetres, profile: z.string().max(60).optional() })
  .strict()

export const figureGrid = z
  .object({
    rows: z.int().min(1).max(12).default(1),
    columns: z.int().min(1).max(12).default(1),
    shareX: z.boolean().default(false),
    shareY: z.boolean().default(false),
  })
  .strict()

/**
 * One figure as it is written down: JSON on the wire, this schema in code, JSON Schema at /schema/figure-spec.v1.json.
 * Everything else about a figure version is a function of this and of the dataset versions it is pinned to.
 */
export const figureSpec = z
  .object({
    $schema: z.string().optional(),
    version: z.literal(1),
    title: label.default(""),
    size: figureSize.prefault({ widthMm: 86, heightMm: 64 }),
    grid: figureGrid.prefault({}),
    panels: z.array(panelParams).min(1).max(24),
  })
  .strict()

export type FigureSpec = z.infer<typeof figureSpec>
/** The spec as a person may write it, before defaults are filled in. */
export type FigureSpecInput = z.input<typeof figureSpec>
