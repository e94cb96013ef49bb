/**
 * The value of a 16-bit float, exactly.
 *
 * @see IEEE 754-2019, binary16
 */
export function halfDouble(bits: number): number {
  const sign = bits & 0x8000 ? -1 : 1
  const exponent = (bits >> 10) & 31
  const fraction = bits & 1023
  if (exponent === 31) return fraction === 0 ? sign * Infinity : NaN
  return exponent === 0 ? sign * fraction * 2 ** -24 : sign * 2 ** (exponent - 15) * (1 + fraction / 1024)
}
