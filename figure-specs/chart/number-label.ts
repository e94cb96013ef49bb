/** A number with the minus sign of typography and at most `digits` decimals. */
export function plainNumber(value: number, digits: number): string {
  const text = value.toFixed(digits)
  return Number(text) === 0 ? (0).toFixed(digits) : text.replace("-", "\u2212")
}

/** A power of ten as TeX: 10^{-3}. */
export const powerOfTen = (exponent: number): string => `$10^{${exponent}}$`

/**
 * One of the values 1 to 9 times a power of ten, for an axis that shows less than two decades: plain where that is
 * short, with a power of ten elsewhere.
 */
export function mantissaNumber(mantissa: number, exponent: number): string {
  if (exponent >= -2 && exponent <= 3) return plainNumber(mantissa * 10 ** exponent, Math.max(0, -exponent))
  return mantissa === 1 ? powerOfTen(exponent) : `$${mantissa}\\times10^{${exponent}}$`
}

/** Rough width of a label in em, for deciding how many fit; the layout measures exactly afterwards. */
export function estimateWidthEm(label: string): number {
  const power = /^\$(.*)10\^\{(.*)\}\$$/.exec(label)
  if (power) return 1.05 + 0.4 * power[2]!.length + (power[1] ? 1.5 : 0)
  return 0.56 * label.length
}
