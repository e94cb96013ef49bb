import { LabelError } from "@specs/chart/label-error"
import type { FigureSpec } from "@specs/figure-spec"
import { SpecError, type SpecIssue } from "@specs/spec-error"
import type { Typesetter } from "../typeset/typesetter"

/** Keys of a spec whose text is set in the figure. */
const labelKeys = new Set(["label", "title", "text", "letter"])

function checkValue(
  value: unknown,
  key: string,
  pointer: string,
  typesetter: Typesetter,
  issues: SpecIssue[],
): void {
  if (typeof value === "string" && labelKeys.has(key)) {
    try {
      typesetter.set(value, false)
    } catch (error) {
      if (!(error instanceof LabelError)) throw error
      issues.push({ pointer, code: error.code, message: `Character ${error.column}: ${error.message}` })
    }
  }
  if (typeof value !== "object" || value === null) return
  for (const [name, inner] of Object.entries(value)) {
    const step = name.replaceAll("~", "~0").replaceAll("/", "~1")
    // Entries of a list are named by the list, so that ["a", "b"] under "text" is text.
    checkValue(inner, Array.isArray(value) ? key : name, `${pointer}/${step}`, typesetter, issues)
  }
}

/** Sets every label of a spec once. @throws SpecError with the place of each that cannot be set */
export function checkLabels(spec: FigureSpec, typesetter: Typesetter): void {
  const issues: SpecIssue[] = []
  checkValue(spec.panels, "", "/panels", typesetter, issues)
  if (issues.length > 0) throw new SpecError(issues)
}
