import type { Box } from "./shape"

/** Points of a frame that carry ink, from its top left corner. */
export type Ink = readonly (readonly [number, number])[]

interface FrameSize {
  readonly widthPt: number
  readonly heightPt: number
}

const cellPt = 2

/**
 * Counts ink in boxes from a table of sums over all cells left of and above each corner, so that thousands of places
 * can be tried.
 *
 * @see F. C. Crow, Summed-area tables for texture mapping, SIGGRAPH 1984
 */
function inkCounter(ink: Ink, { widthPt, heightPt }: FrameSize): (box: Box) => number {
  const columns = Math.ceil(widthPt / cellPt) + 1
  const rows = Math.ceil(heightPt / cellPt) + 1
  const cell = (value: number, count: number) => Math.min(count - 1, Math.max(0, Math.floor(value / cellPt)))
  const sums = new Int32Array((columns + 1) * (rows + 1))
  const at = (column: number, row: number) => row * (columns + 1) + column
  for (const [x, y] of ink) {
    if (x < 0 || y < 0 || x > widthPt || y > heightPt) continue
    sums[at(cell(x, columns) + 1, cell(y, rows) + 1)]! += 1
  }
  for (let row = 1; row <= rows; row += 1)
    for (let column = 1; column <= columns; column += 1)
      sums[at(column, row)]! +=
        sums[at(column - 1, row)]! + sums[at(column, row - 1)]! - sums[at(column - 1, row - 1)]!
  return ({ left, top, right, bottom }) => {
    const [c0, c1] = [cell(left, columns), cell(right, columns) + 1]
    const [r0, r1] = [cell(top, rows), cell(bottom, rows) + 1]
    return sums[at(c1, r1)]! - sums[at(c0, r1)]! - sums[at(c1, r0)]! + sums[at(c0, r0)]!
  }
}

/** How many points of ink lie in a box. */
export const inkIn = (ink: Ink, { left, top, right, bottom }: Box): number =>
  ink.filter(([x, y]) => x >= left && x <= right && y >= top && y <= bottom).length

/** How many points of ink lie in a convex shape, given by its corners clockwise on the page. */
export const inkInside = (ink: Ink, corners: readonly (readonly [number, number])[]): number =>
  ink.reduce((count, [x, y]) => {
    const inside = corners.every(([cx, cy], k) => {
      const [nx, ny] = corners[(k + 1) % corners.length]!
      return (nx - cx) * (y - cy) - (ny - cy) * (x - cx) >= 0
    })
    return count + (inside ? 1 : 0)
  }, 0)

/**
 * The place inside a frame for a box of given size that covers the least ink; of equally free places the one nearest
 * to a corner, the top right one first.
 *
 * @param inset least distance from the frame
 * @returns top left corner of the box
 */
export function freePlace(
  ink: Ink,
  frame: FrameSize,
  size: FrameSize,
  inset: number,
): { readonly x: number; readonly y: number; readonly covered: number } {
  const right = Math.max(inset, frame.widthPt - inset - size.widthPt)
  const bottom = Math.max(inset, frame.heightPt - inset - size.heightPt)
  const steps = (last: number) => {
    const count = Math.max(1, Math.ceil((last - inset) / 4))
    return Array.from({ length: count + 1 }, (_, k) => inset + ((last - inset) * k) / count)
  }
  const corners = [
    [right, inset],
    [inset, bottom],
    [right, bottom],
    [inset, inset],
  ] as const
  const countIn = inkCounter(ink, frame)
  let best = { x: right, y: inset, covered: Infinity, cost: Infinity }
  for (const x of steps(right)) {
    for (const y of steps(bottom)) {
      // A little air around the box counts as covered too.
      const box = {
        left: x - inset / 2,
        top: y - inset / 2,
        right: x + size.widthPt + inset / 2,
        bottom: y + size.heightPt + inset / 2,
      }
      const covered = countIn(box)
      const away = corners.reduce(
        (least, [cx, cy], rank) => Math.min(least, Math.hypot(x - cx, y - cy) + rank * 0.5),
        Infinity,
      )
      const cost = covered * 1000 + away
      if (cost < best.cost) best = { x, y, covered, cost }
    }
  }
  return best
}
