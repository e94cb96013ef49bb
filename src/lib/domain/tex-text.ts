/** Signs that pdfTeX's text fonts lack or that TeX gives a meaning to, as TeX writes them; common practice, from memory. */
const signs: Readonly<Record<string, string>> = {
  "\\": "\\textbackslash{}",
  "%": "\\%",
  "&": "\\&",
  "#": "\\#",
  _: "\\_",
  "{": "\\{",
  "}": "\\}",
  "~": "\\textasciitilde{}",
  "^": "\\textasciicircum{}",
  "–": "--",
  "—": "---",
  "“": "``",
  "”": "''",
  "’": "'",
  "…": "\\ldots{}",
  "\u00a0": "~",
  "\u2009": "\\,",
  "\u202f": "\\,",
  "−": "$-$",
  "×": "$\\times$",
  "±": "$\\pm$",
  "·": "$\\cdot$",
  "≤": "$\\le$",
  "≥": "$\\ge$",
  "≈": "$\\approx$",
  "∞": "$\\infty$",
  "→": "$\\to$",
  "⟨": "$\\langle$",
  "⟩": "$\\rangle$",
  "√": "$\\surd$",
  "∝": "$\\propto$",
}
const greek =
  "alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi o pi rho varsigma sigma tau upsilon phi chi psi omega".split(
    " ",
  )
const superscripts = "⁰¹²³⁴⁵⁶⁷⁸⁹"
const subscripts = "₀₁₂₃₄₅₆₇₈₉"

function signOf(sign: string): string {
  const known = signs[sign]
  if (known !== undefined) return known
  const code = sign.codePointAt(0)!
  const letter = greek[code - 0x3b1]
  if (letter !== undefined) return letter === "o" ? "o" : `$\\${letter}$`
  const capital = greek[code - 0x391]
  if (capital !== undefined && /^(gamma|delta|theta|lambda|xi|pi|sigma|upsilon|phi|psi|omega)$/.test(capital))
    return `$\\${capital[0]!.toUpperCase()}${capital.slice(1)}$`
  const raised = superscripts.indexOf(sign)
  if (raised >= 0) return `$^{${raised}}$`
  const lowered = subscripts.indexOf(sign)
  if (lowered >= 0) return `$_{${lowered}}$`
  if (sign === "⁻") return "$^{-}$"
  return sign
}

/** Plain words with TeX between dollar signs as TeX text: everything outside the dollars prints as it stands. */
export function texOfText(text: string): string {
  return text
    .split(/(\$[^$]*\$)/)
    .map((part) => (/^\$[^$]*\$$/.test(part) ? part : [...part].map(signOf).join("")))
    .join("")
}

/**
 * What is wrong with TeX that a person wrote into a caption; null when nothing is. Braces and dollar signs have to pair:
 * one too many would swallow the text that follows.
 */
export function captionProblem(tex: string): string | null {
  let depth = 0
  let dollars = 0
  const words = tex.replace(/\\./gs, "").replace(/%.*$/gm, "")
  for (const sign of words) {
    if (sign === "{") depth += 1
    if (sign === "}") depth -= 1
    if (sign === "$") dollars += 1
    if (depth < 0) return "A closing brace has no opening one."
  }
  if (depth > 0) return "An opening brace is never closed."
  return dollars % 2 === 1 ? "A dollar sign has no partner." : null
}
