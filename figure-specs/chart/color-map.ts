import { interpolateCividis, interpolateRdBu, interpolateViridis } from "d3-scale-chromatic"
import { channelsOf } from "./tint"

/**
 * Colour maps whose steps look equally large and that keep their order without colour vision: viridis (Smith and
 * van der Walt 2015), cividis (Nuñez, Anderton and Renslow, PLOS ONE 13, e0199239, 2018); RdBu for signed values, with
 * blue below (Harrower and Brewer, The Cartographic Journal 40, 27, 2003).
 */
const maps = {
  viridis: interpolateViridis,
  cividis: interpolateCividis,
  RdBu: (share: number) => interpolateRdBu(1 - share),
}
export type ColorMapName = keyof typeof maps
export const colorMapNames = Object.keys(maps) as readonly ColorMapName[]

const hex = (channel: number) => Math.round(channel).toString(16).padStart(2, "0")

/** Colour of a share of the map as #rrggbb; the library writes some of its maps as rgb(...). */
function colorAt(name: ColorMapName, share: number): string {
  const written = maps[name](share)
  const channels = /^rgb\((\d+), (\d+), (\d+)\)$/.exec(written)?.slice(1).map(Number) ?? channelsOf(written)
  return `#${channels.map(hex).join("")}`
}

/** The colours of a map from its lower to its upper end. */
export const colorSteps = (name: ColorMapName, count: number): readonly string[] =>
  Array.from({ length: count }, (_, k) => colorAt(name, count === 1 ? 0 : k / (count - 1)))
