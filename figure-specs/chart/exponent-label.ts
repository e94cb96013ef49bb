/** TeX of an exponent: a fraction where it is one of small numbers, decimals otherwise. */
export function exponentTex(exponent: number): string {
  for (const denominator of [1, 2, 3, 4, 5, 6, 8]) {
    const numerator = exponent * denominator
    if (Math.abs(numerator - Math.round(numerator)) > 1e-9) continue
    return denominator === 1 ? `${Math.round(numerator)}` : `${Math.round(numerator)}/${denominator}`
  }
  return `${Number(exponent.toPrecision(4))}`
}
