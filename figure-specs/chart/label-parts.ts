import { LabelError } from "./label-error"

/** A stretch of a label: words in the figure's face, perhaps raised and smaller, or TeX. `at` counts from 0. */
export type LabelPart =
  | {
      readonly type: "text"
      readonly text: string
      /** Size relative to the label's, 1 for words. */
      readonly scale: number
      /** How far the baseline is raised, in em of the label's size. */
      readonly riseEm: number
      readonly at: number
    }
  | { readonly type: "math"; readonly tex: string; readonly at: number }

/** Superscripts of plain numbers: size and height as in the mathematics beside them. */
const superscript = { scale: 0.7, riseEm: 0.4 }

const powerOfTen = /^(?:(-?[\d.]+)\s*\\times\s*)?10\^(?:\{(-?\d+)\}|(\d))$/

const minus = (text: string) => text.replace("-", "\u2212")

/**
 * A power of ten is a number and is set in the face of the other numbers, not in that of the mathematics, so that
 * logarithmic and linear axes of one figure look alike.
 */
function numberParts(tex: string, at: number): readonly LabelPart[] | null {
  const match = powerOfTen.exec(tex)
  if (!match) return null
  const [, factor, braced, digit] = match
  const base = factor === undefined ? "10" : `${minus(factor)}\u2009×\u200910`
  return [
    { type: "text", text: base, scale: 1, riseEm: 0, at },
    { type: "text", text: minus(braced ?? digit ?? ""), ...superscript, at },
  ]
}

/** Splits a label at unescaped dollar signs. @throws LabelError dollar-unclosed */
export function labelParts(label: string): readonly LabelPart[] {
  const parts: LabelPart[] = []
  let source = ""
  let start = 0
  let inMath = false
  const finish = () => {
    if (inMath) {
      const tex = source.trim()
      const at = start + source.indexOf(tex)
      parts.push(...(numberParts(tex, at) ?? [{ type: "math" as const, tex, at }]))
    } else if (source !== "") parts.push({ type: "text", text: source, scale: 1, riseEm: 0, at: start })
  }
  for (let k = 0; k < label.length; k += 1) {
    const character = label[k]!
    if (character === "\\" && (label[k + 1] === "$" || inMath)) {
      k += 1
      source += inMath ? character + (label[k] ?? "") : "$"
    } else if (character === "$") {
      finish()
      inMath = !inMath
      source = ""
      start = k + 1
    } else source += character
  }
  if (inMath) {
    const hint = "This $ opens a formula that is not closed. Write \\$ for a dollar sign."
    throw new LabelError("dollar-unclosed", hint, start)
  }
  finish()
  return parts
}
