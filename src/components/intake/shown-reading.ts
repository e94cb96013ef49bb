/** The part of a stored reading that the page shows; lib/tables says what each means. */
export interface ShownReading {
  readonly format: string
  readonly preview: {
    readonly first: readonly { readonly line: number | null; readonly cells: readonly string[] }[]
    readonly last: readonly { readonly line: number | null; readonly cells: readonly string[] }[]
  }
  readonly notes: readonly { readonly code: string; readonly message: string }[]
  readonly problems: readonly { readonly code: string; readonly message: string }[]
  readonly problemCounts: readonly { readonly code: string; readonly count: number }[]
  readonly asks: readonly { readonly message: string }[]
  readonly lineAccount: {
    readonly physical: number
    readonly rows: number
    readonly setAside: number
    readonly headers: number
    readonly comments: number
    readonly blanks: number
  } | null
}
