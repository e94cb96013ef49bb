/** A column as it is named on an axis. */
export interface NamedColumn {
  readonly name: string
  readonly unit: string | null
  /** TeX without dollar signs, or null. */
  readonly symbol: string | null
}

/** TeX of a column: its symbol, or its name where that is a single letter. */
export const symbolOf = ({ symbol, name }: NamedColumn): string | null =>
  symbol ?? (/^[A-Za-z]$/.test(name) ? name : null)

/**
 * A unit as it is set after a symbol. The scale of a model (J, 1/J) is a symbol and slanted; units of measure are upright,
 * their powers raised. J is taken for a coupling: joules are rare among lattice models.
 */
export function unitLabel(unit: string): string {
  if (/^(1\/)?[A-ZΑ-ω]$/u.test(unit) && !["V", "A", "K", "N", "W", "T", "C", "F", "H"].includes(unit))
    return `$${unit}$`
  if (!/[\\^_{]/.test(unit)) return unit
  const raised = unit.replace(/\^(?:\{([^}]*)\}|([+-]?\d+))/g, (_, braced, plain) => `^{${braced ?? plain}}`)
  return `$\\mathrm{${raised.replaceAll(" ", "\\,").replaceAll("*", "\\,")}}$`
}

/** Title of an axis: symbol or name, and the unit in brackets. */
export function axisTitle(column: NamedColumn, tex: string | null = symbolOf(column)): string {
  const name = tex === null ? column.name : `$${tex}$`
  return column.unit ? `${name} [${unitLabel(column.unit)}]` : name
}
