/** A label that cannot be set; `column` counts characters of the label from 1. */
export class LabelError extends Error {
  constructor(
    readonly code:
      | "tex-invalid"
      | "tex-forbidden"
      | "tex-too-long"
      | "tex-too-large"
      | "glyph-missing"
      | "dollar-unclosed",
    message: string,
    readonly column: number,
  ) {
    super(message)
    this.name = "LabelError"
  }
}
