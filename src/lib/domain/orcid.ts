/**
 * Whether a text is an ORCID iD in its written form, check digit included.
 *
 * @see ISO 7064, mod 11-2
 * @example isOrcid("0000-0002-1825-0097") // true
 */
export function isOrcid(text: string): boolean {
  if (!/^\d{4}-\d{4}-\d{4}-\d{3}[\dX]$/.test(text)) return false
  const digits = text.replaceAll("-", "")
  const total = [...digits.slice(0, 15)].reduce((sum, digit) => (sum + Number(digit)) * 2, 0)
  const check = (12 - (total % 11)) % 11
  return digits[15] === (check === 10 ? "X" : String(check))
}
