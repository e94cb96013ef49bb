import { z } from "zod"
import { label } from "./panel-parts"

/** A point of a panel: in the units of its axes, or as shares of its frame from the lower left corner. */
const point = z
  .object({ x: z.number(), y: z.number(), in: z.enum(["data", "frame"]).default("data") })
  .strict()
export type AnnotationPoint = z.infer<typeof point>

const color = z.string().regex(/^#[0-9a-fA-F]{6}$/, "A colour is written #rrggbb.")

const textAnnotation = z
  .object({
    type: z.literal("text"),
    text: label,
    at: point,
    align: z.enum(["left", "center", "right"]).default("center"),
    baseline: z.enum(["top", "middle", "bottom"]).default("middle"),
    angle: z.number().min(-180).max(180).default(0),
    color: color.default("#000000"),
  })
  .strict()

const lineAnnotation = z
  .object({
    type: z.enum(["line", "arrow"]),
    from: point,
    to: point,
    dashed: z.boolean().default(false),
    color: color.default("#000000"),
  })
  .strict()

/** A stretch of one axis, tinted behind the data over the whole frame. */
const spanAnnotation = z
  .object({
    type: z.literal("span"),
    axis: z.enum(["x", "y"]),
    from: z.number(),
    to: z.number(),
    color: color.default("#999999"),
    label: label.optional(),
  })
  .strict()

/** A right triangle whose hypotenuse has the slope of a power law, on logarithmic axes. */
const triangleAnnotation = z
  .object({
    type: z.literal("slope-triangle"),
    /** Left end of the hypotenuse. */
    at: point,
    exponent: z.number().min(-20).max(20),
    /** Length of the horizontal leg. */
    decades: z.number().gt(0).max(10).default(0.5),
    label: label.optional(),
    color: color.default("#000000"),
  })
  .strict()

/** What an author writes and draws into a panel by hand. */
export const annotation = z.discriminatedUnion("type", [
  textAnnotation,
  lineAnnotation,
  spanAnnotation,
  triangleAnnotation,
])
export type Annotation = z.infer<typeof annotation>

export const annotations = z.array(annotation).max(60).default([])
