/** Ticks of an axis, increasing. */
export interface Ticks {
  readonly major: readonly { readonly value: number; readonly label: string }[]
  readonly minor: readonly number[]
  /** The numbers are written in units of this power of ten. */
  readonly power?: number
}
