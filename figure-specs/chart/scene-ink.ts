import type { Ink } from "./free-place"

/** The parts of Vega's scenegraph that say where ink is. */
export interface SceneMark {
  readonly marktype: string
  readonly items?: readonly SceneItem[]
}
interface SceneItem {
  readonly x?: number
  readonly y?: number
  readonly x2?: number
  readonly y2?: number
  readonly defined?: boolean
  readonly path?: string
  readonly bounds?: { readonly x1: number; readonly y1: number; readonly x2: number; readonly y2: number }
  readonly items?: readonly SceneMark[]
}

const spacing = 1.5

/** Points at most 1.5 pt apart from one point to another, the first left out. */
function between(
  from: readonly [number, number],
  to: readonly [number, number],
): (readonly [number, number])[] {
  const steps = Math.max(1, Math.ceil(Math.hypot(to[0] - from[0], to[1] - from[1]) / spacing))
  return Array.from({ length: steps }, (_, k) => {
    const t = (k + 1) / steps
    return [from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1])] as const
  })
}

function polyline(points: readonly (readonly [number, number])[]): (readonly [number, number])[] {
  return points.flatMap((point, k) => (k === 0 ? [point] : between(points[k - 1]!, point)))
}

/** Ink along the M, L, H and V commands that this project's own paths are made of. */
export function pathInk(path: string): Ink {
  const points: (readonly [number, number])[] = []
  let at: readonly [number, number] = [0, 0]
  for (const [, letter, numbers] of path.matchAll(/([MLHV])([^MLHVZ]+)/g)) {
    const [first = 0, second = 0] = numbers!.split(",").map(Number)
    const next = ({ V: [at[0], first], H: [first, at[1]] } as const)[letter!] ?? ([first, second] as const)
    points.push(...(letter === "M" ? [next] : between(at, next)))
    at = next
  }
  return points
}

/** Where the marks of a drawn panel put ink: points along lines and edges of bands, at markers, on error bars. */
export function sceneInk(mark: SceneMark): Ink {
  const items = (mark.items ?? []).filter((item) => item.defined !== false)
  switch (mark.marktype) {
    case "group":
      return items.flatMap((item) => (item.items ?? []).flatMap(sceneInk))
    case "line":
      return polyline(items.map((item) => [item.x ?? 0, item.y ?? 0]))
    case "area":
      return [
        ...polyline(items.map((item) => [item.x ?? 0, item.y ?? 0])),
        ...polyline(items.map((item) => [item.x2 ?? item.x ?? 0, item.y2 ?? item.y ?? 0])),
      ]
    case "rule":
      return items.flatMap((item) =>
        polyline([
          [item.x ?? 0, item.y ?? 0],
          [item.x2 ?? item.x ?? 0, item.y2 ?? item.y ?? 0],
        ]),
      )
    case "symbol":
      return items.flatMap(({ bounds }) =>
        bounds ? [[(bounds.x1 + bounds.x2) / 2, (bounds.y1 + bounds.y2) / 2] as const] : [],
      )
    case "path":
      return items.flatMap(({ path }) => (path ? pathInk(path) : []))
    default:
      return []
  }
}
