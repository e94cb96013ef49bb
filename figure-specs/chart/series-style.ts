import type { Look, MarkerName } from "./drawing"

/** How the curves of a panel are told apart: colour, and beside it marker and dash for eyes and prints without it. */
export interface SeriesStyle {
  readonly color: string
  readonly marker: MarkerName
  readonly dash: readonly number[]
}

const pick = <T>(list: readonly T[], index: number, otherwise: T): T => list[index % list.length] ?? otherwise

export const seriesStyle = (look: Look, index: number): SeriesStyle => ({
  color: pick(look.palette, index, "#000000"),
  marker: pick(look.markers, index, "circle"),
  dash: pick(look.dashes, index, []),
})
