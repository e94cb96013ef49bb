import { isKnownUnit, isUnit } from "./unit-grammar"

export interface NameAndUnit {
  readonly name: string
  readonly unit: string | null
  /** How the unit was found. */
  readonly by: "brackets" | "slash" | "suffix" | null
}

/** Suffixes that name a unit and nothing else; _min, _max, _cm, _bar, _in and single letters mean too much besides. */
const SUFFIX =
  /^(.+)_(fs|ps|ns|us|\u00b5s|\u03bcs|ms|nm|um|\u00b5m|\u03bcm|mm|km|uV|mV|kV|pA|nA|uA|mA|Hz|kHz|MHz|GHz|THz|meV|eV|keV|nK|uK|mK|uT|mT|Pa|kPa|MPa|GPa|rad|deg)$/

/** A longer name is shown as plain text; nothing is read from it. */
const LONGEST = 200

/**
 * Parts a header such as `t [1/J]`, `U (mV)`, `time/J^-1` or `time_us` into name and unit. `x[3]` keeps its index, `A(t)`
 * its argument, `dE/dt` and `T/T_c` their ratio.
 *
 * @see docs/intake.md, Header, rule 6
 */
export function splitUnit(header: string): NameAndUnit {
  if (header.length > LONGEST) return whole(header)
  const bracketed = /^(.+?)(\s*)\[([^[\]]*)\]$/.exec(header)
  if (bracketed) {
    const [, name, gap, unit] = bracketed
    const index = /^\d+$/.test(unit!) && (gap === "" || unit !== "1")
    return index ? whole(header) : { name: name!, unit: unit!.trim(), by: "brackets" }
  }
  const round = /^(.+?)(\s*)\(([^()]*(?:\([^()]*\)[^()]*)*)\)$/.exec(header)
  if (round) {
    const [, name, gap, unit] = round
    const enough = gap !== "" || /[A-Za-z\u00b5\u03bc\u03a9\u00c5°]{2}/.test(unit!)
    return enough && isUnit(unit!) ? { name: name!, unit: unit!.trim(), by: "brackets" } : whole(header)
  }
  const slash = /^([^/]+?)\s*\/\s*(\S+)$/.exec(header)
  if (slash) {
    const [, name, unit] = slash
    const differential = /^[d∂δ]\S/.test(name!) && /^[d∂δ]\S/.test(unit!)
    return !differential && isKnownUnit(unit!) ? { name: name!, unit: unit!, by: "slash" } : whole(header)
  }
  const suffix = SUFFIX.exec(header)
  return suffix ? { name: suffix[1]!, unit: suffix[2]!, by: "suffix" } : whole(header)
}

const whole = (name: string): NameAndUnit => ({ name, unit: null, by: null })
