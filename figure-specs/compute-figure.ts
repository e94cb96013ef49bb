import type { PanelInput, PanelResult } from "./figure-kind"
import type { FigureSpec } from "./figure-spec"
import { kindOf } from "./kinds"
import { SpecError, type SpecIssue } from "./spec-error"

export interface FigureResults {
  readonly panels: readonly PanelResult[]
}

/**
 * Computes every panel of a figure: the one function behind the editor's live numbers, the record on the server, the
 * command line and the verification of a bundle.
 *
 * @param input the tables by dataset name
 * @param onProgress share of the work done, 0 to 1
 * @throws SpecError with every issue of every panel, pointers from the root of the spec
 */
export function computeFigure(
  spec: FigureSpec,
  input: PanelInput,
  onProgress?: (share: number) => void,
): FigureResults {
  const issues: SpecIssue[] = []
  const panels = spec.panels.flatMap((panel, index) => {
    try {
      return [
        kindOf(panel.kind).compute(input, panel, (done, total) =>
          onProgress?.((index + done / total) / spec.panels.length),
        ),
      ]
    } catch (error) {
      if (!(error instanceof SpecError)) throw error
      issues.push(...error.issues.map((issue) => ({ ...issue, pointer: `/panels/${index}${issue.pointer}` })))
      return []
    }
  })
  const names = panels.flatMap((panel, index) => panel.quantities.map(({ name }) => ({ name, index })))
  names.forEach(({ name, index }, at) => {
    if (names.findIndex((other) => other.name === name) < at)
      issues.push({
        pointer: `/panels/${index}/quantities`,
        code: "quantity-repeated",
        message: `Two panels call a quantity ${name}.`,
      })
  })
  if (issues.length > 0) throw new SpecError(issues)
  return { panels }
}

/** Names of the datasets that a figure reads. */
export function datasetsOf(spec: FigureSpec): readonly string[] {
  return [...new Set(spec.panels.map((panel) => panel.data.dataset))]
}
