import type { Quantity } from "./quantity"
import { captionProblem } from "./tex-text"
import { texNameProblem } from "./values-tex"

/** must-fix: the lock is refused. needs-reason: the lock takes a written reason. caution: told, and no more. */
export type CheckWeight = "must-fix" | "needs-reason" | "caution"

/** One thing that stands before the lock. */
export interface DraftCheck {
  readonly code: string
  readonly weight: CheckWeight
  readonly message: string
  /** Name of the figure it is about, or "draft". */
  readonly where: string
}

export interface CheckedFigure {
  readonly name: string
  readonly version: number
  readonly newest: number
  readonly caption: string
  readonly ready: boolean
  /** Datasets of which a newer accepted version exists. */
  readonly staleData: readonly string[]
  readonly quantities: readonly Quantity[]
  readonly warnings: readonly {
    readonly code: string
    readonly severity: string
    readonly message: string
  }[]
}

export interface CheckedDraft {
  readonly figures: readonly CheckedFigure[]
  /** Names of authors who have not signed off on what is pinned now. */
  readonly waitingFor: readonly string[]
  readonly openMustSettle: number
}

function* figureChecks(figure: CheckedFigure): Generator<DraftCheck> {
  const where = figure.name
  const found = (code: string, weight: CheckWeight, message: string) => ({ code, weight, message, where })
  if (!figure.ready)
    yield found(
      "not-computed",
      "must-fix",
      `Version ${figure.version} has no proof yet. Wait for it, or pin another version.`,
    )
  const caption = captionProblem(figure.caption)
  if (caption) yield found("caption-tex", "must-fix", `The caption is not TeX: ${caption}`)
  if (figure.caption.trim() === "") yield found("caption-missing", "caution", "The figure has no caption.")
  for (const { name } of figure.quantities) {
    const problem = texNameProblem(name)
    if (problem) yield found("quantity-name", "must-fix", problem)
  }
  if (figure.newest > figure.version)
    yield found(
      "newer-version",
      "caution",
      `Version ${figure.version} is pinned; version ${figure.newest} exists.`,
    )
  for (const dataset of figure.staleData)
    yield found(
      "newer-data",
      "caution",
      `A newer version of “${dataset}” is accepted than the one that is plotted.`,
    )
  for (const warning of figure.warnings)
    if (warning.severity === "severe") yield found(warning.code, "caution", warning.message)
}

function* sharedNames(figures: readonly CheckedFigure[]): Generator<DraftCheck> {
  const owners = new Map<string, string>()
  for (const figure of figures)
    for (const { name } of figure.quantities) {
      const owner = owners.get(name)
      if (owner !== undefined)
        yield {
          code: "quantity-shared",
          weight: "must-fix",
          message: `\\${name} is a quantity of ${owner} too; a macro has one value.`,
          where: figure.name,
        }
      owners.set(name, figure.name)
    }
}

/** Everything that stands before the lock of a draft, figure by figure, then the draft as a whole. */
export function draftChecks({ figures, waitingFor, openMustSettle }: CheckedDraft): readonly DraftCheck[] {
  const checks = [...figures.flatMap((figure) => [...figureChecks(figure)]), ...sharedNames(figures)]
  const add = (code: string, weight: CheckWeight, message: string) =>
    checks.push({ code, weight, message, where: "draft" })
  if (figures.length === 0) add("nothing-pinned", "must-fix", "The draft pins no figure yet.")
  if (waitingFor.length > 0)
    add("sign-offs-missing", "needs-reason", `Sign-offs are missing from ${waitingFor.join(", ")}.`)
  if (openMustSettle > 0)
    add(
      "threads-open",
      "needs-reason",
      `${openMustSettle} ${openMustSettle === 1 ? "thread has" : "threads have"} to be settled.`,
    )
  return checks
}
