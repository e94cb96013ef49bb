import { written } from "@specs/chart/position"
import type { Shape } from "@specs/chart/shape"
import type { Typesetter } from "../typeset/typesetter"

/** A shape of the layout as SVG. */
export function shapeSvg(shape: Shape, typesetter: Typesetter): string {
  if (shape.type === "text") return typesetter.svg(shape)
  if (shape.type === "image") {
    const { x, y, width, height, href } = shape
    const place = `x="${written(x)}" y="${written(y)}" width="${written(width)}" height="${written(height)}"`
    // Two names of one property: renderers know one or the other.
    const crisp = 'style="image-rendering:optimizeSpeed;image-rendering:pixelated"'
    return `<image ${place} preserveAspectRatio="none" ${crisp} xlink:href="${href}"/>`
  }
  const { d, fill, stroke, widthPt, dash = [] } = shape
  const line = stroke === null ? "" : ` stroke="${stroke}" stroke-width="${written(widthPt)}"`
  const dashed =
    stroke !== null && dash.length > 0 ? ` stroke-dasharray="${dash.map(written).join(",")}"` : ""
  return `<path d="${d}" fill="${fill ?? "none"}"${line}${dashed}/>`
}

export const shapesSvg = (shapes: readonly Shape[], typesetter: Typesetter): string =>
  shapes.map((shape) => shapeSvg(shape, typesetter)).join("")

/** Shapes moved to a place. */
export function movedSvg(x: number, y: number, inside: string): string {
  return `<g transform="translate(${written(x)},${written(y)})">${inside}</g>`
}
