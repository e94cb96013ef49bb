import type { FrameLabel, TextPlace } from "./drawing"

interface Point {
  readonly x: number
  readonly y: number
}

export interface SlopeGuide {
  readonly from: Point
  readonly to: Point
  /** Which side of the guide is free of data: its label stands there. */
  readonly side: "above" | "below"
}

interface Surroundings {
  readonly widthPt: number
  readonly heightPt: number
  /** Points of all curves, in points of the frame. */
  readonly curves: readonly Point[]
  /** Stretch of the frame in which a guide is of use, left to right. */
  readonly stretch: readonly [number, number]
  /** Room for the label beyond the guide. */
  readonly labelPt: number
  readonly gapPt: number
}

/** Distance by which a guide through the origin must move to pass the curves on one side, or null without curves there. */
function shiftPast(
  curves: readonly Point[],
  slope: number,
  side: "above" | "below",
  gapPt: number,
): number | null {
  if (curves.length === 0) return null
  const offsets = curves.map(({ x, y }) => y - slope * x)
  return side === "above" ? Math.min(...offsets) - gapPt : Math.max(...offsets) + gapPt
}

/**
 * Places a straight line of given slope beside the curves, as near as its distance allows, so that the eye can compare:
 * above the data if there is room, below otherwise, in the middle of the useful stretch if possible.
 *
 * @param slope in points of the frame, downwards positive
 */
export function placeSlopeGuide(slope: number, around: Surroundings): SlopeGuide | null {
  const { widthPt, heightPt, labelPt, gapPt } = around
  const span = around.stretch[1] - around.stretch[0]
  const edge = 4
  for (const share of [0.5, 0.36, 0.24]) {
    const length = Math.min(share * span, (0.55 * heightPt) / Math.max(Math.abs(slope), 1e-9))
    for (const side of ["above", "below"] as const) {
      for (const shift of [0, 0.12, -0.12, 0.24, -0.24, 0.36, -0.36]) {
        const middle = (around.stretch[0] + around.stretch[1]) / 2 + shift * span
        const [left, right] = [middle - length / 2, middle + length / 2]
        if (left < edge || right > widthPt - edge) continue
        const near = around.curves.filter(({ x }) => x >= left - gapPt && x <= right + gapPt)
        const intercept = shiftPast(near, slope, side, gapPt)
        if (intercept === null) continue
        const from = { x: left, y: intercept + slope * left }
        const to = { x: right, y: intercept + slope * right }
        const top = Math.min(from.y, to.y) - (side === "above" ? labelPt : 0)
        const bottom = Math.max(from.y, to.y) + (side === "below" ? labelPt : 0)
        if (top >= edge && bottom <= heightPt - edge) return { from, to, side }
      }
    }
  }
  return null
}

/** Label along a line: at its middle, its end or its start, parallel to it, on the given side. */
export function labelAlong(
  text: string,
  color: string,
  { from, to, side }: SlopeGuide,
  distancePt: number,
): FrameLabel {
  const turn = Math.atan2(to.y - from.y, to.x - from.x)
  const outwards = side === "above" ? -1 : 1
  const places = [0.5, 0.72, 0.28].map((share): TextPlace => ({
    x: from.x + share * (to.x - from.x) - outwards * distancePt * Math.sin(turn),
    y: from.y + share * (to.y - from.y) + outwards * distancePt * Math.cos(turn),
    align: "center",
    baseline: side === "above" ? "bottom" : "top",
    angle: (turn * 180) / Math.PI,
  }))
  return { text, color, small: true, places }
}
