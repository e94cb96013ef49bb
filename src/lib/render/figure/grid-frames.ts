import type { Margins } from "@specs/chart/surroundings"

/** A panel's place in the grid, counted from 1, and the room it needs around its frame. */
export interface PlacedPanel {
  readonly row: number
  readonly column: number
  readonly rowSpan: number
  readonly columnSpan: number
  readonly margins: Margins
}

/** A data rectangle on the page, in points from the figure's top left. */
export interface FrameRect {
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
}

interface Track {
  readonly start: number
  readonly span: number
  readonly before: number
  readonly after: number
}

/**
 * Divides one direction of the page: every track gets the largest margin that a panel starting or ending in it needs,
 * what remains is shared evenly by the frames.
 *
 * @returns where each track's frame begins, and the length they all have
 */
function divide(tracks: readonly Track[], count: number, total: number, edge: number, gap: number) {
  const before = Array.from({ length: count }, (_, k) =>
    tracks.reduce((most, track) => (track.start === k ? Math.max(most, track.before) : most), 0),
  )
  const after = Array.from({ length: count }, (_, k) =>
    tracks.reduce(
      (most, track) => (track.start + track.span - 1 === k ? Math.max(most, track.after) : most),
      0,
    ),
  )
  const taken = [...before, ...after].reduce((sum, margin) => sum + margin, 2 * edge + (count - 1) * gap)
  const length = (total - taken) / count
  const starts: number[] = []
  let at = edge
  for (let k = 0; k < count; k += 1) {
    at += before[k]!
    starts.push(at)
    at += length + after[k]! + gap
  }
  return { starts, length }
}

/**
 * The frames of a figure: equal in size, aligned across rows and columns, as large as the page allows.
 *
 * @param edge free space at the rim of the page
 * @param gaps free space between what belongs to neighbouring panels
 */
export function gridFrames(
  panels: readonly PlacedPanel[],
  grid: { readonly rows: number; readonly columns: number },
  page: { readonly width: number; readonly height: number },
  {
    edge,
    gaps,
  }: { readonly edge: number; readonly gaps: { readonly columns: number; readonly rows: number } },
): readonly FrameRect[] {
  const across = panels.map(({ column, columnSpan, margins }): Track => ({
    start: column - 1,
    span: columnSpan,
    before: margins.left,
    after: margins.right,
  }))
  const down = panels.map(({ row, rowSpan, margins }): Track => ({
    start: row - 1,
    span: rowSpan,
    before: margins.top,
    after: margins.bottom,
  }))
  const columns = divide(across, grid.columns, page.width, edge, gaps.columns)
  const rows = divide(down, grid.rows, page.height, edge, gaps.rows)
  return panels.map(({ row, column, rowSpan, columnSpan }) => {
    const x = columns.starts[column - 1]!
    const y = rows.starts[row - 1]!
    return {
      x,
      y,
      width: columns.starts[column + columnSpan - 2]! + columns.length - x,
      height: rows.starts[row + rowSpan - 2]! + rows.length - y,
    }
  })
}
