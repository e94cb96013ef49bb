/** How much weight a warning has: to know, to weigh, or so grave that the number should not be quoted. */
export type WarningSeverity = "note" | "caution" | "severe"

/** Something a referee would ask about; made from the catalogue only. */
export interface StatisticalWarning {
  readonly code: string
  readonly severity: WarningSeverity
  /** One sentence in plain words, with the numbers of this case. */
  readonly message: string
  /** What it speaks of: a curve, a quantity, a time. */
  readonly where: string
}
