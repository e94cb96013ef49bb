const greek = new Map(
  (
    "α alpha β beta γ gamma δ delta ε epsilon ζ zeta η eta θ theta ι iota κ kappa λ lambda μ mu µ mu ν nu ξ xi π pi ρ rho " +
    "σ sigma τ tau υ upsilon φ phi χ chi ψ psi ω omega Γ Gamma Δ Delta Θ Theta Λ Lambda Ξ Xi Π Pi Σ Sigma Φ Phi Ψ Psi Ω Omega"
  )
    .split(" ")
    .flatMap((word, index, words) =>
      index % 2 === 1
        ? [
            [words[index - 1]!, `\\${word}`],
            [word, `\\${word}`],
          ]
        : [],
    ) as [string, string][],
)

/**
 * The TeX symbol that a column name stands for, or null when the name is a word or the guess would be bold: `t`, `S_z`,
 * `n0`, `omega`, `ΔE`, `A(t)`.
 *
 * @param name a name without unit that passed `isPlainName`
 * @example texSymbol("gamma_eff") // "\\gamma_{\\mathrm{eff}}"
 */
export function texSymbol(name: string): string | null {
  const call = /^([^()\s]+)\(([^()\s]+)\)$/.exec(name)
  if (call) {
    const [base, argument] = [texSymbol(call[1]!), texSymbol(call[2]!)]
    return base && argument ? `${base}(${argument})` : null
  }
  const [base, below, ...more] = name.split("_")
  if (more.length > 0) return null
  if (below !== undefined) {
    const symbol = baseSymbol(base!)
    return symbol && /^[A-Za-z0-9]{1,12}$/.test(below) ? `${symbol}_${subscript(below)}` : null
  }
  const numbered = /^(\D+?)(\d{1,2})$/.exec(name)
  if (numbered) {
    const symbol = baseSymbol(numbered[1]!)
    return symbol && `${symbol}_${subscript(numbered[2]!)}`
  }
  return baseSymbol(name)
}

function baseSymbol(text: string): string | null {
  if (/^[A-Za-z]$/.test(text)) return text
  const whole = greek.get(text)
  if (whole) return whole
  const difference = /^[ΔδΣ]([A-Za-z])$/.exec(text)
  return difference ? `${greek.get(text[0]!)} ${difference[1]}` : null
}

function subscript(text: string): string {
  if (/^[A-Za-z0-9]$/.test(text)) return text
  return /^\d+$/.test(text) ? `{${text}}` : `{\\mathrm{${text}}}`
}
