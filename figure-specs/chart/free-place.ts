import type { Box } from "./shape"

/** Points of a frame that carry ink, from its top left corner. */
export type Ink = readonly (readonly [number, number])[]

/** How many points of ink lie in a box. */
export const inkIn = (ink: Ink, box: Box): number =>
  ink.reduce(
    (count, [x, y]) => count + (x >= box.left && x <= box.right && y >= box.top && y <= box.bottom ? 1 : 0),
    0,
  )

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
  frame: { readonly widthPt: number; readonly heightPt: number },
  size: { readonly widthPt: number; readonly heightPt: number },
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
      const covered = inkIn(ink, box)
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
