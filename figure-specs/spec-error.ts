/** One thing wrong with a figure spec or with the data it binds, at its place. */
export interface SpecIssue {
  /** JSON pointer into the figure spec (RFC 6901), e.g. "/panels/0/fit/window". */
  readonly pointer: string
  readonly code: string
  readonly message: string
}

/** A figure that cannot be computed or drawn as written; carries every issue found, each with its place. */
export class SpecError extends Error {
  constructor(readonly issues: readonly SpecIssue[]) {
    super(issues.map((issue) => `${issue.pointer}: ${issue.message}`).join("\n"))
    this.name = "SpecError"
  }
}
