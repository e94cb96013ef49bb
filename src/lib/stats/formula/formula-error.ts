export type FormulaErrorCode =
  | "EMPTY"
  | "TOO_LONG"
  | "TOO_DEEP"
  | "UNEXPECTED"
  | "BAD_NUMBER"
  | "UNKNOWN_NAME"
  | "UNKNOWN_FUNCTION"
  | "ARGUMENTS"

/** What is wrong with a formula, and where. */
export class FormulaError extends Error {
  constructor(
    readonly code: FormulaErrorCode,
    /** Index of the first character concerned, from 0. */
    readonly position: number,
    message: string,
  ) {
    super(message)
    this.name = "FormulaError"
  }
}
