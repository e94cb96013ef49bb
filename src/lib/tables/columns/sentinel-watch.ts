/** Values by which programs mark what is missing; 9.96921e36 is NetCDF's fill value for floats, printed in full or cut. */
const markers = [-999, -9999, 9.96921e36, 9.969209968386869e36, 1e20, 1e30]
const FEWEST = 3
const FACTOR = 100

/** Counts values that look like markers for “missing” and keeps the range of the others. */
export class SentinelWatch {
  readonly #counts = new Map<number, number>()
  #largestOther = 0

  /** @param min smallest finite value of the part */
  add(values: Float64Array, min: number, max: number): void {
    if (min > -999 && max < 1e20) {
      this.#largestOther = Math.max(this.#largestOther, -min, max)
      return
    }
    for (let row = 0; row < values.length; row++) {
      const value = values[row]!
      if (value - value !== 0) continue
      if ((value <= -999 || value >= 1e20) && markers.includes(value))
        this.#counts.set(value, (this.#counts.get(value) ?? 0) + 1)
      else if (Math.abs(value) > this.#largestOther) this.#largestOther = Math.abs(value)
    }
  }

  /** Markers at three rows or more and beyond 100 times everything else. */
  get suspects(): { readonly value: number; readonly count: number }[] {
    return [...this.#counts]
      .filter(([value, count]) => count >= FEWEST && Math.abs(value) > FACTOR * this.#largestOther)
      .map(([value, count]) => ({ value, count }))
  }
}
