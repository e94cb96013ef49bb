import type { FigureSpec } from "@specs/figure-spec"
import { SpecError, type SpecIssue } from "@specs/spec-error"

/** Checks that every panel lies in the grid and no two share a cell. @throws SpecError place-outside, place-taken */
export function checkPlaces({ panels, grid }: FigureSpec): void {
  const issues: SpecIssue[] = []
  const taken = new Map<string, number>()
  panels.forEach(({ place: { row, column, rowSpan, columnSpan } }, index) => {
    const pointer = `/panels/${index}/place`
    if (row + rowSpan - 1 > grid.rows || column + columnSpan - 1 > grid.columns) {
      const size = `${grid.rows} ${grid.rows === 1 ? "row" : "rows"} and ${grid.columns} ${grid.columns === 1 ? "column" : "columns"}`
      issues.push({
        pointer,
        code: "place-outside",
        message: `The grid has ${size}; this panel lies outside.`,
      })
      return
    }
    for (let r = row; r < row + rowSpan; r += 1)
      for (let c = column; c < column + columnSpan; c += 1) {
        const other = taken.get(`${r},${c}`)
        if (other === undefined) taken.set(`${r},${c}`, index)
        else if (!issues.some((issue) => issue.pointer === pointer))
          issues.push({
            pointer,
            code: "place-taken",
            message: `Row ${r}, column ${c} already holds panel ${other + 1}.`,
          })
      }
  })
  if (issues.length > 0) throw new SpecError(issues)
}
