/**
 * JSON with one text for one value: keys sorted by code unit, no blanks, numbers in their shortest round-trip form. Two
 * equal values have equal bytes, so a checksum of the text is a checksum of the value.
 *
 * @throws TypeError for values that JSON has no form for (functions, NaN, infinities, undefined inside an array)
 * @see RFC 8785 (JSON Canonicalization Scheme), whose number and key rules these are
 */
export function canonicalJson(value: unknown): string {
  if (value === null || typeof value === "boolean" || typeof value === "string") return JSON.stringify(value)
  if (typeof value === "number") {
    if (!Number.isFinite(value)) throw new TypeError(`${value} has no form in JSON.`)
    return JSON.stringify(value)
  }
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(",")}]`
  if (typeof value === "object") {
    const entries = Object.entries(value).filter(([, entry]) => entry !== undefined)
    entries.sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0))
    return `{${entries.map(([key, entry]) => `${JSON.stringify(key)}:${canonicalJson(entry)}`).join(",")}}`
  }
  throw new TypeError(`A ${typeof value} has no form in JSON.`)
}
