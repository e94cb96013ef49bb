/** Ticks of an axis, increasing. */
export interface Ticks {
  readonly major: readonly { readonly value: number; readonly label: string }[]
  readonly minor: readonly number[]
}
