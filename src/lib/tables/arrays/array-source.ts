import type { ColumnWriter, NumberWriter, TextWriter } from "../columns/column-writer"
import type { IntakeCodeName, SentenceValues } from "../intake-codes"
import type { ColumnKind } from "../table-reading"

/** A column that an array gives. */
export interface ArrayOutput {
  readonly name: string
  readonly unit: string | null
  readonly symbol: string | null
  readonly longName: string | null
  readonly kind: ColumnKind
}

/** One array of a file, not yet read: a number array, a complex one (two outputs) or a structured one (one a field). */
export interface ArraySource {
  /** Name by which problems call it. */
  readonly place: string
  /** Where it lives: arrays of one group may share axes. */
  readonly group: string
  readonly outputs: readonly ArrayOutput[]
  readonly shape: readonly number[]
  /** Names that the file gives to the axes. */
  readonly labels: readonly (string | null)[]
  /** Columns that the file attaches to the axes. */
  readonly scales: readonly (string | null)[]
  /** Writes all values in C order, to one writer for each output. */
  read(writers: readonly ColumnWriter[]): Promise<void>
}

/** An array that cannot be read: it is left out, and the others are read without it. */
export class ArrayFailure extends Error {
  override readonly name = "ArrayFailure"
  constructor(
    readonly code: IntakeCodeName,
    readonly values: SentenceValues,
  ) {
    super(code)
  }
}

export const elementsOf = (shape: readonly number[]): number =>
  shape.reduce((product, length) => product * length, 1)

export function numberWriter(writer: ColumnWriter | undefined): NumberWriter {
  if (writer?.kind !== "number") throw new TypeError("This column takes numbers.")
  return writer
}

export function textWriter(writer: ColumnWriter | undefined): TextWriter {
  if (writer?.kind !== "text") throw new TypeError("This column takes texts.")
  return writer
}
