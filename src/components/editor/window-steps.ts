/** Index of the grid point nearest to a value; on a positive grid nearest by ratio, as on a logarithmic axis. */
export function nearestIndex(grid: readonly number[], value: number): number {
  const logarithmic = (grid[0] ?? 0) > 0 && value > 0
  const distance = (x: number) => (logarithmic ? Math.abs(Math.log(x / value)) : Math.abs(x - value))
  let best = 0
  for (let k = 1; k < grid.length; k += 1) if (distance(grid[k]!) < distance(grid[best]!)) best = k
  return best
}

const tenthOfDecade = 10 ** 0.1

/** Where a key moves an edge of the window, or null for keys that do not. */
export function shiftedEdge(
  grid: readonly number[],
  value: number,
  key: string,
  far: boolean,
): number | null {
  const direction =
    key === "ArrowRight" || key === "ArrowUp" ? 1 : key === "ArrowLeft" || key === "ArrowDown" ? -1 : 0
  if (key === "Home") return grid[0] ?? null
  if (key === "End") return grid.at(-1) ?? null
  if (direction === 0) return null
  const index = nearestIndex(grid, value)
  const neighbour = Math.min(grid.length - 1, Math.max(0, index + direction))
  if (!far || value <= 0) return grid[neighbour] ?? null
  const target = nearestIndex(grid, value * tenthOfDecade ** direction)
  return grid[target === index ? neighbour : target] ?? null
}
