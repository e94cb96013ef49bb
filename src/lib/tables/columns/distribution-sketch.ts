import type { DistributionSketch } from "../table-reading"

const FINE_BINS = 192
const SHOWN_BINS = 24

/**
 * Counts finite values in bins whose range doubles as needed, so that one pass suffices. The shown bins are made from
 * finer ones: a count may sit one fine bin off its place, which the eye cannot see.
 */
export class SketchBuilder {
  #low = 0
  #width = 0
  #counts = new Float64Array(FINE_BINS)
  #given = false

  /** Makes the range cover [min, max] of the values that follow. */
  cover(min: number, max: number): void {
    if (this.#width === 0) {
      this.#low = min
      this.#width = (max - min) / (FINE_BINS - 1) || Math.abs(min) * 1e-9 || 1e-9
    }
    while (min < this.#low && !this.#given) this.#double(true)
    while (max >= this.#low + FINE_BINS * this.#width && !this.#given) this.#double(false)
  }

  add(value: number): void {
    const bin = Math.floor((value - this.#low) / this.#width)
    if (!this.#given) this.#counts[bin < 0 ? 0 : bin >= FINE_BINS ? FINE_BINS - 1 : bin]!++
  }

  /** Merges neighbouring bins; the new room is below or above. */
  #double(below: boolean): void {
    const merged = new Float64Array(FINE_BINS)
    const shift = below ? FINE_BINS / 2 : 0
    for (let bin = 0; bin < FINE_BINS; bin++) merged[shift + (bin >> 1)]! += this.#counts[bin]!
    if (below) this.#low -= FINE_BINS * this.#width
    this.#width *= 2
    this.#counts = merged
    // Ranges next to the largest double have no bins.
    this.#given = !Number.isFinite(this.#low + FINE_BINS * this.#width * 2) || !Number.isFinite(this.#low)
  }

  /** Bins from min to max; null when the range cannot be binned. */
  shown(min: number, max: number): DistributionSketch | null {
    const width = (max - min) / SHOWN_BINS
    const total = this.#counts.reduce((sum, count) => sum + count, 0)
    if (this.#given || !Number.isFinite(width)) return null
    if (!(width > 0)) return { low: min, high: max, counts: [total] }
    const counts = Array<number>(SHOWN_BINS).fill(0)
    this.#counts.forEach((count, bin) => {
      const centre = this.#low + (bin + 0.5) * this.#width
      counts[Math.max(0, Math.min(SHOWN_BINS - 1, Math.floor((centre - min) / width)))]! += count
    })
    return { low: min, high: max, counts }
  }
}
