/** A label that cannot be set; `column` counts characters of the label from 1. */
export class LabelError extends Error {
  constructor(
    readonly code:
      | "TEX_INVALID"
      | "TEX_FORBIDDEN"
      | "TEX_TOO_LONG"
      | "TEX_TOO_LARGE"
      | "GLYPH_MISSING"
      | "DOLLAR_UNCLOSED",
    message: string,
    readonly column: number,
  ) {
    super(message)
    this.name = "LabelError"
  }
}
