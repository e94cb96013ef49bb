import type { FigureSpec } from "@specs/figure-spec"
import type { GridPlace, InsetPlace } from "@specs/schema/place"
import { SpecError, type SpecIssue } from "@specs/spec-error"

export type Panel = FigureSpec["panels"][number]
export type GridPanel = Panel & { readonly place: GridPlace }
export type InsetPanel = Panel & { readonly place: InsetPlace }

export const isInset = (panel: Panel): panel is InsetPanel => "inside" in panel.place
export const isGridPanel = (panel: Panel): panel is GridPanel => !isInset(panel)

const plural = (count: number, word: string) => `${count} ${word}${count === 1 ? "" : "s"}`

function insetIssue(panels: readonly Panel[], { place }: InsetPanel): Omit<SpecIssue, "pointer"> | null {
  const host = panels[place.inside - 1]
  if (!host) {
    const message = `There is no panel ${place.inside} for this inset to stand in.`
    return { code: "place-outside", message }
  }
  if (isGridPanel(host)) return null
  return { code: "place-nested", message: "An inset cannot stand inside another inset." }
}

/**
 * Checks that every panel lies in the grid, no two share a cell, and every inset stands in a panel of the grid.
 *
 * @throws SpecError place-outside, place-taken, place-nested
 */
export function checkPlaces({ panels, grid }: FigureSpec): void {
  const issues: SpecIssue[] = []
  const taken = new Map<string, number>()
  panels.forEach((panel, index) => {
    const pointer = `/panels/${index}/place`
    if (!isGridPanel(panel)) {
      const issue = isInset(panel) ? insetIssue(panels, panel) : null
      if (issue) issues.push({ pointer, ...issue })
      return
    }
    const { row, column, rowSpan, columnSpan } = panel.place
    if (row + rowSpan - 1 > grid.rows || column + columnSpan - 1 > grid.columns) {
      const size = `${plural(grid.rows, "row")} and ${plural(grid.columns, "column")}`
      const message = `The grid has ${size}; this panel lies outside.`
      issues.push({ pointer, code: "place-outside", message })
      return
    }
    const cells = Array.from({ length: rowSpan * columnSpan }, (_, k) => ({
      r: row + Math.floor(k / columnSpan),
      c: column + (k % columnSpan),
    }))
    const shared = cells.find(({ r, c }) => taken.has(`${r},${c}`))
    for (const { r, c } of cells) if (!taken.has(`${r},${c}`)) taken.set(`${r},${c}`, index)
    if (!shared) return
    const { r, c } = shared
    const message = `Row ${r}, column ${c} already holds panel ${taken.get(`${r},${c}`)! + 1}.`
    issues.push({ pointer, code: "place-taken", message })
  })
  if (issues.length > 0) throw new SpecError(issues)
}
