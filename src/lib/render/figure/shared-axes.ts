import type { AxisDrawing, PanelDrawing } from "@specs/chart/drawing"
import type { FigureSpec } from "@specs/figure-spec"

type Panel = FigureSpec["panels"][number]

/** The columns of the grid that a panel covers, or its rows: panels that cover the same ones have frames in line. */
const tracks = ({ place }: Panel, axis: "x" | "y"): string =>
  axis === "x" ? `${place.column}+${place.columnSpan}` : `${place.row}+${place.rowSpan}`

/** Panels that share an axis with one: the same frame edges, so that a value stands at the same place in all. */
const inLine = (panels: readonly Panel[], axis: "x" | "y", index: number): readonly number[] =>
  panels.flatMap((panel, other) => (tracks(panel, axis) === tracks(panels[index]!, axis) ? [other] : []))

/**
 * The panels of a figure with shared axes: each gets the widest domain of those it shares an axis with.
 *
 * @param drawings the panels drawn with their own domains
 */
export function withSharedDomains(
  panels: readonly Panel[],
  drawings: readonly PanelDrawing[],
  grid: FigureSpec["grid"],
): readonly Panel[] {
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

const bare = (axis: AxisDrawing): AxisDrawing => ({
  ...axis,
  title: "",
  major: axis.major.map(({ value }) => ({ value, label: "" })),
})

/** A drawing without the numbers and titles that the panel at the foot of its column, or the head of its row, carries. */
export function withoutRepeatedLabels(
  drawing: PanelDrawing,
  panels: readonly Panel[],
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
