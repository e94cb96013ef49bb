import type { CollapseExponents, SizeCurve } from "./size-curve"

export interface CollapseQuality {
  /** Mean squared distance of a point from the others' master curve in units of both errors; about 1 is good. */
  readonly quality: number
  /** Points that at least one other size encloses. */
  readonly points: number
}

/**
 * Quality S of a collapse: every scaled point is held against one weighted straight line through the two neighbours that
 * enclose it in each other set, S = (1/N) sum (y - Y)^2/(dy^2 + dY^2). In logarithms with relative errors.
 *
 * @see Houdayer & Hartmann, Phys. Rev. B 70, 014418 (2004); Melchert, arXiv:0910.5403
 */
export function collapseQuality(curves: readonly SizeCurve[], { a, z }: CollapseExponents): CollapseQuality {
  let sum = 0
  let points = 0
  for (const own of curves) {
    for (let k = 0; k < own.x.length; k += 1) {
      const x = own.x[k]! - z * own.lnSize
      // Sums over the enclosing neighbours, their abscissas taken from x so that the line's level is its value there.
      let s = 0
      let sx = 0
      let sy = 0
      let sxx = 0
      let sxy = 0
      for (const other of curves) {
        if (other === own) continue
        const above = firstAbove(other.x, x + z * other.lnSize)
        if (above === 0 || above === other.x.length) continue
        for (let j = above - 1; j <= above; j += 1) {
          const w = 1 / (other.error[j]! * other.error[j]!)
          const dx = other.x[j]! - z * other.lnSize - x
          const y = other.y[j]! - a * other.lnSize
          s += w
          sx += w * dx
          sy += w * y
          sxx += w * dx * dx
          sxy += w * dx * y
        }
      }
      if (s === 0) continue
      const determinant = s * sxx - sx * sx
      const level = (sxx * sy - sx * sxy) / determinant
      const variance = sxx / determinant
      const distance = own.y[k]! - a * own.lnSize - level
      sum += (distance * distance) / (own.error[k]! ** 2 + variance)
      points += 1
    }
  }
  return { quality: points > 0 ? sum / points : Infinity, points }
}

/** Index of the first value above x in an increasing array. */
function firstAbove(values: Float64Array, x: number): number {
  let low = 0
  let high = values.length
  while (low < high) {
    const middle = (low + high) >> 1
    if (values[middle]! <= x) low = middle + 1
    else high = middle
  }
  return low
}
