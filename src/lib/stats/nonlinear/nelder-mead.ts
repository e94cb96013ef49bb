export interface SimplexResult {
  readonly point: Float64Array
  readonly value: number
  readonly evaluations: number
  /** Whether the simplex shrank to the tolerance; false when the evaluations ran out. */
  readonly converged: boolean
}

/**
 * Nelder–Mead minimisation of a function that need not be smooth; it may be Infinity where it is not defined, but not at
 * the start.
 *
 * @param start point; @param step length of the first simplex along each axis
 * @param tolerance extent of the simplex in every coordinate at which to stop
 * @see Nelder & Mead, Comput. J. 7, 308 (1965); Lagarias et al., SIAM J. Optim. 9, 112 (1998) for the rules
 */
export function nelderMead(
  f: (point: Float64Array) => number,
  start: ArrayLike<number>,
  step: ArrayLike<number>,
  tolerance: number,
  evaluationLimit = 2000,
): SimplexResult {
  const d = start.length
  let evaluations = 0
  const rate = (point: Float64Array) => {
    evaluations += 1
    return { point, value: f(point) }
  }
  const corners = [rate(Float64Array.from(start))]
  for (let j = 0; j < d; j += 1)
    corners.push(rate(Float64Array.from({ length: d }, (_, k) => start[k]! + (k === j ? step[k]! : 0))))
  const order = () => corners.sort((a, b) => a.value - b.value)
  order()
  const extent = () =>
    Math.max(
      ...corners
        .slice(1)
        .map(({ point }) => Math.max(...point.map((v, j) => Math.abs(v - corners[0]!.point[j]!)))),
    )
  while (extent() > tolerance && evaluations < evaluationLimit) {
    const worst = corners[d]!
    const centre = Float64Array.from({ length: d }, (_, j) => {
      let sum = 0
      for (let c = 0; c < d; c += 1) sum += corners[c]!.point[j]!
      return sum / d
    })
    /** Beyond the centre as seen from the worst corner: 1 reflects, 2 expands, +-1/2 contracts. */
    const along = (factor: number) =>
      rate(centre.map((value, j) => value + factor * (value - worst.point[j]!)))
    const reflected = along(1)
    if (reflected.value < corners[0]!.value) {
      const expanded = along(2)
      corners[d] = expanded.value < reflected.value ? expanded : reflected
    } else if (reflected.value < corners[d - 1]!.value) corners[d] = reflected
    else {
      const contracted = along(reflected.value < worst.value ? 0.5 : -0.5)
      if (contracted.value < Math.min(reflected.value, worst.value)) corners[d] = contracted
      else {
        const best = corners[0]!.point
        for (let c = 1; c <= d; c += 1)
          corners[c] = rate(corners[c]!.point.map((v, j) => best[j]! + (v - best[j]!) / 2))
      }
    }
    order()
  }
  const [best] = corners
  return { point: best!.point, value: best!.value, evaluations, converged: extent() <= tolerance }
}
