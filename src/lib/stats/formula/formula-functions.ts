/** A function of the formula language. */
export interface FormulaFunction {
  readonly fewest: number
  readonly most: number
  readonly apply: (values: readonly number[]) => number
}

const one = (apply: (value: number) => number): FormulaFunction => ({
  fewest: 1,
  most: 1,
  apply: ([value]) => apply(value!),
})

/** All of them; log is the natural logarithm. */
export const formulaFunctions: ReadonlyMap<string, FormulaFunction> = new Map([
  ["sqrt", one(Math.sqrt)],
  ["exp", one(Math.exp)],
  ["log", one(Math.log)],
  ["abs", one(Math.abs)],
  ["min", { fewest: 2, most: 16, apply: (values) => Math.min(...values) }],
  ["max", { fewest: 2, most: 16, apply: (values) => Math.max(...values) }],
])

export const formulaConstants: ReadonlyMap<string, number> = new Map([["pi", Math.PI]])
