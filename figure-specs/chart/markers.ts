import type { MarkerName } from "./drawing"
import { written } from "./position"

/** Corners on a square from -1 to 1; all shapes have about the area of the unit circle, so that none looks larger. */
const outlines = {
  circle: null,
  square: [
    [-0.886, -0.886],
    [0.886, -0.886],
    [0.886, 0.886],
    [-0.886, 0.886],
  ],
  triangle: [
    [0, -1.45],
    [1.27, 0.74],
    [-1.27, 0.74],
  ],
  diamond: [
    [0, -1.25],
    [1.25, 0],
    [0, 1.25],
    [-1.25, 0],
  ],
  "triangle-down": [
    [0, 1.45],
    [1.27, -0.74],
    [-1.27, -0.74],
  ],
} as const

/** Whether a marker is filled with its colour or with paper. */
export const isFilled = (name: MarkerName): boolean => !name.startsWith("open-")

/** Outline of a marker around a point, as an SVG path. With radius 1 at the origin it is what Vega takes as a shape. */
export function markerPath(name: MarkerName, x: number, y: number, radius: number): string {
  const corners = outlines[name.replace(/^open-/, "") as keyof typeof outlines]
  if (corners) {
    const [first, ...rest] = corners.map(
      ([px, py]) => `${written(x + px * radius)},${written(y + py * radius)}`,
    )
    return `M${first}L${rest.join("L")}Z`
  }
  const arc = `A${written(radius)},${written(radius)},0,1,1,`
  const [right, left] = [written(x + radius), written(x - radius)]
  return `M${right},${written(y)}${arc}${left},${written(y)}${arc}${right},${written(y)}Z`
}
