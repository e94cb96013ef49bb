import type { AxisDrawing, PanelDrawing } from "@specs/chart/drawing"
import type { FigureSpec } from "@specs/figure-spec"
import type { GridPanel } from "./panel-places"

/** The columns of the grid that a panel covers, or its rows: panels that cover the same ones have frames in line. */
const tracks = ({ place }: GridPanel, axis: "x" | "y"): string =>
  axis === "x" ? `${place.column}+${place.columnSpan}` : `${place.row}+${place.rowSpan}`

/** Panels that share an axis with one: the same frame edges, so that a value stands at the same place in all. */
const inLine = (panels: readonly GridPanel[], axis: "x" | "y", index: number): readonly number[] =>
  panels.flatMap((panel, other) => (tracks(panel, axis) === tracks(panels[index]!, axis) ? [other] : []))

/**
 * The panels of a figure with shared axes: each gets the widest domain of those it shares an axis with.
 *
 * @param drawings the panels drawn with their own domains
 */
export function withSharedDomains(
  panels: readonly GridPanel[],
  drawings: readonly PanelDrawing[],
  grid: FigureSpec["grid"],
): readonly GridPanel[] {
  const shared = (axis: "x" | "y", index: number): [number, number] | undefined => {
    if (!(axis === "x" ? grid.shareX : grid.shareY)) return panels[index]!.axes[axis].domain
    const domains = inLine(panels, axis, index).map((other) => drawings[other]!.axes[axis].domain)
    return [Math.min(...domains.map(([low]) => low)), Math.max(...domains.map(([, high]) => high))]
  }
  return panels.map((panel, index) => ({
    ...panel,
    axes: {
      x: { ...panel.axes.x, domain: shared("x", index) },
      y: { ...panel.axes.y, domain: shared("y", index) },
    },
  }))
}

const bare = ({ factor: _factor, ...axis }: AxisDrawing): AxisDrawing => ({
  ...axis,
  title: "",
  major: axis.major.map(({ value }) => ({ value, label: "" })),
})

/** A drawing without the numbers and titles that the panel at the foot of its column, or the head of its row, carries. */
export function withoutRepeatedLabels(
  drawing: PanelDrawing,
  panels: readonly GridPanel[],
  index: number,
  grid: FigureSpec["grid"],
): PanelDrawing {
  const { place } = panels[index]!
  const foot = inLine(panels, "x", index).every((other) => panels[other]!.place.row <= place.row)
  const head = inLine(panels, "y", index).every((other) => panels[other]!.place.column >= place.column)
  return {
    ...drawing,
    axes: {
      ...drawing.axes,
      x: grid.shareX && !foot ? bare(drawing.axes.x) : drawing.axes.x,
      y: grid.shareY && !head ? bare(drawing.axes.y) : drawing.axes.y,
    },
  }
}

/** Drawings in which a colour bar that several panels of a row have in common stands beside the last of them only. */
export function withoutRepeatedBars(
  drawings: readonly PanelDrawing[],
  panels: readonly GridPanel[],
): readonly PanelDrawing[] {
  const bars = drawings.map(({ colorBar }) => (colorBar ? JSON.stringify(colorBar) : null))
  return drawings.map((drawing, index) => {
    const repeated = inLine(panels, "y", index).some(
      (other) => bars[other] === bars[index] && panels[other]!.place.column > panels[index]!.place.column,
    )
    return repeated ? { ...drawing, colorBar: null } : drawing
  })
}
