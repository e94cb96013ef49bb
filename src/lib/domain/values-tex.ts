import type { Quantity } from "./quantity"

/** Control sequences of TeX and the usual classes that a quantity must not take over; common practice, from memory. */
const reserved = new Set(
  `alpha beta gamma delta epsilon varepsilon zeta eta theta vartheta iota kappa lambda mu nu xi pi varpi rho varrho sigma
  varsigma tau upsilon phi varphi chi psi omega Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi Omega
  a b c d e f g h i j k l m n o p q r s t u v w x y z aa AA ae AE oe OE ss
  and author begin end date title maketitle section subsection paragraph part chapter label ref cite caption figure table
  text textbf textit emph frac sqrt sum int prod lim log ln exp sin cos tan min max sup inf det dim ker deg arg gcd Pr
  left right big Big bigg Bigg hat bar vec dot ddot tilde check breve acute grave mathrm mathbf mathit mathcal mathbb
  over under atop choose of to in ni not par par line page space skip vskip hskip quad qquad hfill vfill box hbox vbox
  def let edef gdef xdef newcommand renewcommand providecommand input include newif fi else or if ifx relax count
  today year month day time number the unit qty num ang si SI value values thanks email affiliation collaboration`
    .split(/\s+/)
    .filter(Boolean),
)

/** What is wrong with a name as a TeX macro, with a proposal; null when nothing is. */
export function texNameProblem(name: string): string | null {
  if (!/^[A-Za-z]+$/.test(name)) return `“${name}” is not letters only, so it cannot be a TeX macro.`
  if (reserved.has(name))
    return `\\${name} means something in TeX already; use \\my${name[0]!.toUpperCase()}${name.slice(1)} or the like.`
  return null
}

const escapeComment = (text: string) => text.replace(/[\r\n]+/g, " ")

/** One named quantity with the figure version it comes from. */
export interface QuantitySource {
  readonly quantity: Quantity
  readonly figure: string
  readonly version: number
}

/** How a macro writes its number: as TeX mathematics, or for the siunitx package. */
export type ValuesForm = "plain" | "siunitx"

/** siunitx reads a bracket; unequal sides, and what is no plain number, stay mathematics. */
const bodyOf = ({ tex, text }: Quantity, form: ValuesForm) =>
  form === "siunitx" && /^-?[\d.]+(\([\d.]+\))?(e-?\d+)?$/.test(text)
    ? `\\num{${text}}`
    : `\\ensuremath{${tex}}`

/**
 * values.tex: a macro for every named quantity, `\name{}` in the text, with its interval and origin as a comment.
 *
 * @throws Error for a name that TeX has already, or that two quantities share
 */
export function valuesTex(
  sources: readonly QuantitySource[],
  heading: string,
  form: ValuesForm = "plain",
): string {
  const seen = new Map<string, QuantitySource>()
  const lines = sources.map((source) => {
    const { quantity, figure, version } = source
    const problem = texNameProblem(quantity.name)
    if (problem) throw new Error(problem)
    const other = seen.get(quantity.name)
    if (other)
      throw new Error(`Two quantities are called ${quantity.name}: in ${other.figure} and in ${figure}.`)
    seen.set(quantity.name, source)
    const interval = quantity.interval
      ? `, ${Number((quantity.interval.level * 100).toPrecision(4))} % [${quantity.interval.low}, ${quantity.interval.high}] ${quantity.interval.type}`
      : ""
    return [
      `% ${escapeComment(`${figure}, version ${version}: ${quantity.value}${interval}`)}`,
      `\\newcommand{\\${quantity.name}}{${bodyOf(quantity, form)}}`,
    ].join("\n")
  })
  const needs = form === "siunitx" ? "% Needs \\usepackage{siunitx} before it.\n" : ""
  return `% ${escapeComment(heading)}\n${needs}% Use a macro in the text as \\name{}; the brackets hold one standard error.\n${lines.join("\n")}\n`
}
