/** Red, green and blue of #rrggbb or #rgb, 0 to 255. */
export function channelsOf(color: string): readonly [number, number, number] {
  const long = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i.exec(color)
  const short = /^#([0-9a-f])([0-9a-f])([0-9a-f])$/i.exec(color)
  const parts = long ? long.slice(1) : short ? short.slice(1).map((digit) => digit + digit) : null
  if (!parts) throw new Error(`“${color}” is not a colour of the form #rrggbb.`)
  return parts.map((part) => parseInt(part, 16)) as [number, number, number]
}

/**
 * A colour mixed with white paper once and for all. Bands are drawn in such opaque tints under the lines, because EPS
 * knows no transparency and the formats should not differ.
 *
 * @param strength share of the colour, 0 to 1
 */
export function tint(color: string, strength: number): string {
  const mixed = channelsOf(color).map((channel) => Math.round(255 - (255 - channel) * strength))
  return `#${mixed.map((channel) => channel.toString(16).padStart(2, "0")).join("")}`
}
