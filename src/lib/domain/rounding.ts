/**
 * Rounding of a value to its uncertainty by decimal arithmetic on the shortest round-trip text of each number, ties to
 * even; never through binary rounding.
 *
 * @see Particle Data Group, Review of Particle Physics, Introduction, section 5.3 (three leading digits of the uncertainty
 *   100-354: two digits; 355-949: one; 950-999: rounds up to 1000 and keeps two)
 * @see JCGM 100:2008 (GUM), 7.2.6: at most two digits of an uncertainty
 */

/** sign * digits * 10^-scale, digits a non-negative integer. */
interface Decimal {
  readonly negative: boolean
  readonly digits: bigint
  readonly scale: number
}

/** The exact decimal of a finite double's shortest text. */
export function decimalOf(x: number): Decimal {
  const match = /^(-?)(\d+)(?:\.(\d+))?(?:e([+-]\d+))?$/.exec(String(x))
  if (!match) throw new RangeError(`${x} has no decimal form.`)
  const [, sign, whole, fraction = "", exponent = "0"] = match
  const digits = BigInt(whole! + fraction)
  const scale = fraction.length - Number(exponent)
  return {
    negative: sign === "-",
    digits: scale < 0 ? digits * 10n ** BigInt(-scale) : digits,
    scale: Math.max(scale, 0),
  }
}

/** Rounds to a multiple of 10^-places (places may be negative), ties to even; the result counts multiples of 10^-places. */
export function multiplesOf(x: number, places: number): bigint {
  const { negative, digits, scale } = decimalOf(x)
  const drop = scale - places
  if (drop <= 0) return (negative ? -1n : 1n) * digits * 10n ** BigInt(-drop)
  const unit = 10n ** BigInt(drop)
  const quotient = digits / unit
  const twice = 2n * (digits % unit)
  const up = twice > unit || (twice === unit && quotient % 2n === 1n)
  return (negative ? -1n : 1n) * (up ? quotient + 1n : quotient)
}

/** Decimal places to which an uncertainty, and with it its value, is written. */
export function placesOfUncertainty(u: number, digits: "pdg" | "two" = "pdg"): number {
  const { digits: all, scale } = decimalOf(u)
  const text = all.toString()
  const leading = text.length - 1 - scale
  const three = Number(multiplesOf(u, 2 - leading))
  const kept = digits === "two" ? 2 : three >= 355 && three < 950 ? 1 : 2
  const place = kept - 1 - leading
  // 950 to 999 becomes 1000, of which two digits are kept: one decade higher.
  return three >= 950 ? place - 1 : place
}

/** A count of multiples of 10^-places as plain decimal text; a negative zero loses its sign. */
export function plainDecimal(multiples: bigint, places: number): string {
  const negative = multiples < 0n
  const digits = (negative ? -multiples : multiples).toString()
  if (places <= 0) return `${negative ? "-" : ""}${digits}${multiples === 0n ? "" : "0".repeat(-places)}`
  const padded = digits.padStart(places + 1, "0")
  return `${negative ? "-" : ""}${padded.slice(0, -places)}.${padded.slice(-places)}`
}

/** The bracket: digits alone when they end where the value ends, with the point when the uncertainty reaches above 1. */
function bracket(u: number, places: number): string {
  const multiples = multiplesOf(u, places)
  if (places <= 0) return plainDecimal(multiples, places)
  const text = plainDecimal(multiples, places)
  return text.startsWith("0.") ? multiples.toString() : text
}

export interface Written {
  /** 0.587(12) */
  readonly text: string
  /** The same for TeX: siunitx input and plain mathematics agree on it. */
  readonly tex: string
}

const plainNumber = (x: number): string => (Number.isFinite(x) ? String(Number(x.toPrecision(6))) : String(x))

/** The exponent of ten when the value is written in scientific form: below 1e-3 or from 1e6 on. */
function scientificExponent(value: number): number | null {
  if (value === 0) return null
  const exponent = Math.floor(Math.log10(Math.abs(value)))
  return exponent < -3 || exponent > 5 ? exponent : null
}

/**
 * A value with its standard error in brackets: `0.587(12)`, `2.5(1.2)`, `1.000(23)e-7`.
 * Without a usable standard error (zero, missing, not finite) the value stands alone with six digits and no bracket.
 *
 * @example writeQuantity(0.58712, 0.0123).text // "0.587(12)"
 */
export function writeQuantity(
  value: number,
  standardError: number | null,
  options: { digits?: "pdg" | "two"; scientific?: boolean } = {},
): Written {
  if (
    standardError === null ||
    !(standardError > 0) ||
    !Number.isFinite(standardError) ||
    !Number.isFinite(value)
  )
    return { text: plainNumber(value), tex: plainNumber(value) }
  const exponent = options.scientific === false ? null : scientificExponent(value)
  if (exponent !== null && standardError < Math.abs(value)) {
    const scale = (x: number) =>
      Number(`${x}e${-exponent}`.replace(/e(-?\d+)e(-?\d+)$/, (_, a, b) => `e${Number(a) + Number(b)}`))
    const inner = writeQuantity(scale(value), scale(standardError), { ...options, scientific: false }).text
    return { text: `${inner}e${exponent}`, tex: `${inner} \\times 10^{${exponent}}` }
  }
  const places = placesOfUncertainty(standardError, options.digits)
  const text = `${plainDecimal(multiplesOf(value, places), places)}(${bracket(standardError, places)})`
  return { text, tex: text }
}

/**
 * A value with unequal uncertainties, `0.587(+14)(-11)`; the smaller one sets the digits. Sides that differ by less than
 * a tenth of their mean are written as one symmetric uncertainty, their mean.
 */
export function writeAsymmetric(value: number, plus: number, minus: number): Written {
  const mean = (plus + minus) / 2
  if (Math.abs(plus - minus) < 0.1 * mean) return writeQuantity(value, mean, { scientific: false })
  const places = placesOfUncertainty(Math.min(plus, minus))
  const shown = plainDecimal(multiplesOf(value, places), places)
  const up = bracket(plus, places)
  const down = bracket(minus, places)
  const asTex = (u: number) => plainDecimal(multiplesOf(u, places), places)
  return { text: `${shown}(+${up})(-${down})`, tex: `${shown}^{+${asTex(plus)}}_{-${asTex(minus)}}` }
}
