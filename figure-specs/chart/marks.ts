import type { Data, Mark, Scale, Spec } from "vega"
import type { AxisDrawing, MarkerName } from "./drawing"
import { isFilled, markerPath } from "./markers"
import { written } from "./position"

const paper = "#ffffff"

/** A table of a drawing by its name; rows are plain numbers. */
export const dataSet = (name: string, rows: readonly Record<string, number | boolean | string>[]): Data => ({
  name,
  values: [...rows],
})

/** Vega's scale of an axis: the domain as it is, no rounding, zero only where the domain says so. */
export function scaleOf(
  name: "x" | "y",
  axis: Pick<AxisDrawing, "scale" | "domain" | "symlogConstant">,
): Scale {
  const range = name === "x" ? "width" : "height"
  const domain = [...axis.domain]
  if (axis.scale === "log") return { name, type: "log", base: 10, domain, range, nice: false, zero: false }
  if (axis.scale === "symlog")
    return { name, type: "symlog", constant: axis.symlogConstant ?? 1, domain, range, nice: false }
  return { name, type: "linear", domain, range, nice: false, zero: false }
}

const place = (field: string, scale: "x" | "y") => ({ scale, field })

/** A band between two columns in an opaque tint. */
export const bandMark = (data: string, x: string, low: string, high: string, fill: string): Mark => ({
  type: "area",
  from: { data },
  encode: { enter: { x: place(x, "x"), y: place(low, "y"), y2: place(high, "y"), fill: { value: fill } } },
})

interface Stroke {
  readonly color: string
  readonly widthPt: number
  readonly dash?: readonly number[]
}

const strokeOf = ({ color, widthPt, dash = [] }: Stroke) => ({
  stroke: { value: color },
  strokeWidth: { value: widthPt },
  ...(dash.length > 0 ? { strokeDash: { value: [...dash] } } : {}),
})

/** A line through the rows of a table; rows whose column `gap` is true interrupt it. */
export const lineMark = (data: string, x: string, y: string, stroke: Stroke): Mark => ({
  type: "line",
  from: { data },
  encode: {
    enter: {
      x: place(x, "x"),
      y: place(y, "y"),
      defined: { signal: "!datum.gap" },
      strokeJoin: { value: "round" },
      ...strokeOf(stroke),
    },
  },
})

/** Markers at the rows of a table. */
export const pointMark = (
  data: string,
  x: string,
  y: string,
  {
    marker,
    color,
    sizePt,
    outlinePt,
  }: { marker: MarkerName; color: string; sizePt: number; outlinePt: number },
): Mark => ({
  type: "symbol",
  from: { data },
  encode: {
    enter: {
      x: place(x, "x"),
      y: place(y, "y"),
      shape: { value: markerPath(marker, 0, 0, 1) },
      size: { value: sizePt ** 2 },
      fill: { value: isFilled(marker) ? color : paper },
      ...(isFilled(marker) ? {} : { stroke: { value: color }, strokeWidth: { value: outlinePt } }),
    },
  },
})

/**
 * Paths in points of the frame, column "path" of a table: for what would be hundreds of marks of its own, such as all
 * error bars of a curve. In a table and not in the mark, so that a working view can exchange it like other data.
 */
export const pathMark = (data: string, stroke: Stroke): Mark => ({
  type: "path",
  from: { data },
  encode: { enter: { path: { field: "path" }, ...strokeOf(stroke) } },
})

/** Vertical bars without caps, merged into one path. Positions in points of the frame. */
export const barsPath = (
  bars: readonly { readonly x: number; readonly from: number; readonly to: number }[],
): string => bars.map(({ x, from, to }) => `M${written(x)},${written(from)}V${written(to)}`).join("")

type Point = { readonly x: number; readonly y: number }

/** A straight line from one point of the frame to another. */
export const linePath = (from: Point, to: Point): string =>
  `M${written(from.x)},${written(from.y)}L${written(to.x)},${written(to.y)}`

/** The Vega specification of a panel: frame-sized, data inlined, marks cut at the frame. */
export function panelSpec(parts: {
  readonly widthPt: number
  readonly heightPt: number
  readonly x: AxisDrawing
  readonly y: AxisDrawing
  readonly data: readonly Data[]
  readonly marks: readonly Mark[]
}): Spec {
  return {
    $schema: "https://vega.github.io/schema/vega/v6.json",
    width: parts.widthPt,
    height: parts.heightPt,
    padding: 0,
    autosize: "none",
    config: { aria: false } as Spec["config"],
    data: [...parts.data],
    scales: [scaleOf("x", parts.x), scaleOf("y", parts.y)],
    marks: [
      {
        type: "group",
        clip: true,
        encode: { enter: { width: { signal: "width" }, height: { signal: "height" } } },
        marks: [...parts.marks],
      },
    ],
  }
}
