const HEX = /^([+-]?)0[xX]([0-9a-fA-F]*)\.?([0-9a-fA-F]*)[pP]([+-]?\d+)$/

/**
 * The double written as a hexadecimal float (C's `%a`), or null when the text is not one or not exact in a double.
 *
 * @see ISO/IEC 9899:2018, 6.4.4.2
 * @example hexDouble("0x1.8p+1") // 3
 */
export function hexDouble(text: string): number | null {
  const match = HEX.exec(text)
  if (!match) return null
  const [, sign, whole, fraction, power] = match
  if (whole === "" && fraction === "") return null
  const mantissa = BigInt(`0x${whole}${fraction}`)
  const bits = mantissa === 0n ? 0 : mantissa.toString(2).replace(/0+$/, "").length
  if (bits > 53) return null
  const value = scaled(Number(mantissa), Number(power) - 4 * fraction!.length)
  if (value === null) return null
  return sign === "-" ? -value : value
}

/** mantissa x 2^exponent in steps that stay in range; null when the result is not exact. */
function scaled(mantissa: number, exponent: number): number | null {
  if (mantissa === 0) return 0
  if (Math.abs(exponent) > 4000) return null
  let value = mantissa
  let left = exponent
  while (left !== 0) {
    const step = Math.max(-1000, Math.min(1000, left))
    const next = value * 2 ** step
    if (!Number.isFinite(next) || next * 2 ** -step !== value) return null
    value = next
    left -= step
  }
  return value
}
