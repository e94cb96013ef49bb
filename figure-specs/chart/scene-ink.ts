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
  readonly items?: readonly SceneMark[]
}

const spacing = 2

type Point = readonly [number, number]

/** Adds points at most 2 pt apart from one point to another, the first left out. */
function addBetween(from: Point, to: Point, ink: Point[]): void {
  const steps = Math.max(1, Math.ceil(Math.hypot(to[0] - from[0], to[1] - from[1]) / spacing))
  for (let k = 1; k < steps; k += 1)
    ink.push([from[0] + (k / steps) * (to[0] - from[0]), from[1] + (k / steps) * (to[1] - from[1])])
  ink.push(to)
}

function addPolyline(points: readonly Point[], ink: Point[]): void {
  points.forEach((point, k) => (k === 0 ? void ink.push(point) : addBetween(points[k - 1]!, point, ink)))
}

/** Ink along the M, L, H and V commands that this project's own paths are made of. */
export function pathInk(path: string): Ink {
  const ink: Point[] = []
  let at: Point = [0, 0]
  for (const [, letter, numbers] of path.matchAll(/([MLHV])([^MLHVZ]+)/g)) {
    const [first = 0, second = 0] = numbers!.split(",").map(Number)
    const next: Point = letter === "V" ? [at[0], first] : letter === "H" ? [first, at[1]] : [first, second]
    if (letter === "M") ink.push(next)
    else addBetween(at, next, ink)
    at = next
  }
  return ink
}

const start = ({ x = 0, y = 0 }: SceneItem): Point => [x, y]
const end = ({ x = 0, y = 0, x2 = x, y2 = y }: SceneItem): Point => [x2, y2]

function addMark({ marktype, items = [] }: SceneMark, ink: Point[]): void {
  const defined = items.filter((item) => item.defined !== false)
  switch (marktype) {
    case "group":
      for (const item of items) for (const mark of item.items ?? []) addMark(mark, ink)
      return
    case "line":
      return addPolyline(defined.map(start), ink)
    case "area":
      addPolyline(defined.map(start), ink)
      return addPolyline(defined.map(end), ink)
    case "rule":
      return defined.forEach((item) => addPolyline([start(item), end(item)], ink))
    case "symbol":
      return defined.forEach((item) => void ink.push(start(item)))
    case "path":
      return defined.forEach(({ path }) => void ink.push(...pathInk(path ?? "")))
    default:
      return
  }
}

/** Where the marks of a drawn panel put ink: points along lines and edges of bands, at markers, on error bars. */
export function sceneInk(root: SceneMark): Ink {
  const ink: Point[] = []
  addMark(root, ink)
  return ink
}
