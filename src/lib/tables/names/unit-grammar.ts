const SYMBOL = String.raw`(?:1|%|arb\. ?u\.|a\.u\.|\\hbar|J_[a-z]|[A-Za-z\u00b5\u03bc°\u00c5\u03a9]{1,6})`
const POWER = String.raw`(?:\^?-?\d+(?:/\d+)?|\^\{-?\d+(?:/\d+)?\}|\*\*-?\d+)`
const FACTOR = `${SYMBOL}${POWER}?`
const UNIT = new RegExp(`^${FACTOR}(?:[*·. /]${FACTOR})*$`)

/** Words that pass the grammar and describe a quantity instead of measuring it. */
const notUnits = new Set(
  "total mean avg median raw std sd sem err error per site sites real imag re im abs norm fit NA na nan NaN inf Inf none None null".split(
    " ",
  ),
)

const baseSymbols = "m g s A K Hz N Pa J W C V F \u03a9 Ohm S T H eV G lm lx Bq".split(" ")
const prefixes = "f p n u \u00b5 \u03bc m c d k M G T".split(" ")
const knownSymbols = new Set([
  "1",
  "%",
  ..."rad deg ° \u00c5 min h d u Da a.u. ħ \\hbar J_x J_y J_z".split(" "),
  ...baseSymbols.filter((symbol) => symbol !== "N"),
  ...prefixes.flatMap((prefix) => baseSymbols.map((symbol) => prefix + symbol)),
])

/**
 * Whether a text can be a unit: factors with powers, joined by `*`, `·`, `.` or `/`, known ones also by
 * a blank. A factor is 1, %, a symbol
 * of up to six letters or a bare model constant such as J or \hbar.
 *
 * @see docs/intake.md, Header, rule 6
 * @example isUnit("J^-1") // true
 */
export function isUnit(text: string): boolean {
  const unit = text.trim()
  if (!UNIT.test(unit)) return false
  if (unit.includes(" ") && !unit.startsWith("arb.")) return everyKnown(unit)
  return !unit.split(/[*·./]/).some((word) => notUnits.has(word))
}

/** Whether every factor is a unit that physicists use; for places where a ratio such as n/n0 looks the same. */
export const isKnownUnit = (text: string): boolean => isUnit(text) && everyKnown(text)

function everyKnown(unit: string): boolean {
  const symbols = unit
    .replace(new RegExp(POWER, "g"), (power) => (power === "1" ? "1" : " "))
    .split(/[*·/ ]+/)
  return symbols.filter((symbol) => symbol !== "").every((symbol) => knownSymbols.has(symbol))
}
