import type { IntakeCodeName, SentenceValues } from "../intake-codes"

/** How one value, or one member of a compound, is stored; bytes are little-endian unless a member says otherwise. */
export type Hdf5Type =
  | { readonly kind: "number"; readonly type: string; readonly size: number }
  | { readonly kind: "boolean"; readonly size: number }
  /** Parts are floats of half the size. */
  | { readonly kind: "complex"; readonly size: number }
  | {
      readonly kind: "enum"
      readonly type: string
      readonly size: number
      readonly names: readonly [string, number][]
    }
  | { readonly kind: "bytes"; readonly size: number }
  | { readonly kind: "strings"; readonly size: number }
  | {
      readonly kind: "compound"
      readonly size: number
      readonly members: readonly Hdf5Member[]
    }
  | { readonly kind: "unread"; readonly size: number; readonly what: string }

export interface Hdf5Member {
  readonly name: string
  readonly offset: number
  readonly type: Hdf5Type
  readonly littleEndian: boolean
}

export interface Hdf5Dataset {
  /** Without the leading slash. */
  readonly path: string
  readonly type: Hdf5Type
  readonly shape: readonly number[]
  readonly chunks: readonly number[] | null
  readonly unit: string | null
  readonly longName: string | null
  readonly symbol: string | null
  readonly labels: readonly (string | null)[]
  /** Paths of datasets attached as scales. */
  readonly scales: readonly (string | null)[]
}

export interface Hdf5Listing {
  readonly datasets: readonly Hdf5Dataset[]
  readonly metadata: readonly { readonly key: string; readonly value: string; readonly place: string }[]
  readonly problems: readonly {
    readonly code: IntakeCodeName
    readonly path: string
    readonly values: SentenceValues
  }[]
  readonly notes: readonly { readonly code: IntakeCodeName; readonly values: SentenceValues }[]
}

export type Hdf5Question =
  | { readonly ask: "list"; readonly path: string }
  | {
      readonly ask: "read"
      readonly path: string
      readonly type: Hdf5Type
      readonly offset: readonly number[]
      readonly count: readonly number[]
    }

export type Hdf5Answer =
  | { readonly listing: Hdf5Listing }
  | { readonly bytes: Uint8Array }
  | { readonly texts: readonly string[] }
  | { readonly failure: IntakeCodeName; readonly values: SentenceValues }
