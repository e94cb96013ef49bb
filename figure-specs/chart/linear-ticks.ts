import { plainNumber } from "./number-label"
import type { Ticks } from "./ticks"

/** Smallest of 1, 2, 5 times a power of ten that is at least `rough`. */
export function niceStep(rough: number): number {
  const power = 10 ** Math.floor(Math.log10(rough))
  const factor = [1, 2, 5, 10].find((candidate) => candidate * power >= rough * (1 - 1e-9)) ?? 10
  return factor * power
}

/** Multiples of a step inside a closed interval, each computed from its index so that errors do not add up. */
export function multiplesIn([low, high]: readonly [number, number], step: number): number[] {
  const slack = step * 1e-9
  const first = Math.ceil((low - slack) / step)
  const last = Math.floor((high + slack) / step)
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, k) => tidy((first + k) * step))
}

/** Removes the binary dust of a product such as 3 x 0.1. */
const tidy = (value: number): number => Number(value.toPrecision(12))

/**
 * Ticks of a linear axis: steps of 1, 2 or 5, as many as fit and at most eight, minor ticks between.
 *
 * @param domain lower and upper end, increasing
 * @param room how many labels of the given text fit along the axis
 */
export function linearTicks(domain: readonly [number, number], room: (label: string) => number): Ticks {
  const span = domain[1] - domain[0]
  const largest = Math.max(Math.abs(domain[0]), Math.abs(domain[1]))
  // Numbers of many digits are written in units of a power of ten, which stands once at the end of the axis.
  const order = Math.floor(Math.log10(largest))
  const power = order >= 5 || order <= -4 ? order : 0
  let count = 8
  for (;;) {
    const step = niceStep(span / count)
    const digits = Math.max(0, -Math.floor(Math.log10(step / 10 ** power) + 1e-9))
    const label = (value: number) => plainNumber(value / 10 ** power, digits)
    const major = multiplesIn(domain, step).map((value) => ({ value, label: label(value) }))
    const longest = major.reduce((long, { label: text }) => (text.length > long.length ? text : long), "")
    if (major.length <= room(longest) || count <= 2) {
      const mantissa = Math.round(step / 10 ** Math.floor(Math.log10(step) + 1e-9))
      const fine = multiplesIn(domain, step / (mantissa === 2 ? 4 : 5))
      const taken = new Set(major.map(({ value }) => value))
      return { major, minor: fine.filter((value) => !taken.has(value)), power }
    }
    count -= 1
  }
}
