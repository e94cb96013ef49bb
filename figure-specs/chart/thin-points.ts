/**
 * Indices of points that can carry a marker each without touching: the first of the curve, then always the next that
 * is at least `apartPt` away from the last one chosen.
 */
export function thinPoints(
  points: readonly { readonly x: number; readonly y: number }[],
  apartPt: number,
): readonly number[] {
  const chosen: number[] = []
  points.forEach(({ x, y }, index) => {
    const last = points[chosen.at(-1) ?? -1]
    if (!last || Math.hypot(x - last.x, y - last.y) >= apartPt) chosen.push(index)
  })
  return chosen
}
