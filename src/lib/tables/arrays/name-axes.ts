import type { ArrayAxis } from "../table-reading"
import type { ArraySource } from "./array-source"

export interface NamedAxes {
  /** Null for arrays of one axis. */
  readonly axes: readonly ArrayAxis[] | null
  /** Some axis has no name. */
  readonly open: boolean
  /** Axes that took the one array of their length as coordinate. */
  readonly matched: readonly { readonly axis: number; readonly coordinate: string }[]
}

const lastPart = (name: string): string => name.slice(name.lastIndexOf("/") + 1)

/**
 * Names the axes of an array: as the recipe says, else as the file says, else by the one and only array of that length
 * beside it. Two axes of one length are never matched, and nothing is ever guessed from the order.
 *
 * @see docs/intake.md, Arrays
 */
export function nameAxes(
  source: ArraySource,
  all: readonly ArraySource[],
  told: readonly string[] | null,
): NamedAxes {
  const { shape } = source
  if (shape.length === 1) return { axes: null, open: false, matched: [] }
  const lines = all.filter(
    (other) =>
      other !== source &&
      other.shape.length === 1 &&
      other.outputs.length === 1 &&
      other.outputs[0]!.kind === "number",
  )
  const beside = lines.filter((other) => other.group === source.group)
  const matched: { axis: number; coordinate: string }[] = []
  const axes = shape.map((length, axis): ArrayAxis => {
    const fits = lines.filter((other) => other.shape[0] === length)
    const columnOf = (name: string) =>
      fits
        .map(({ outputs }) => outputs[0]!.name)
        .find((column) => column === name || lastPart(column) === name) ?? null
    const scale = source.scales[axis] ?? null
    const attached = scale === null ? null : columnOf(scale)
    const given = source.labels[axis] ?? (attached === null ? scale : lastPart(attached))
    const candidates = beside.filter((other) => other.shape[0] === length)
    const alone = candidates.length === 1 && shape.filter((other) => other === length).length === 1
    const matching = given === null && alone ? candidates[0]!.outputs[0]!.name : null
    const toldName = told?.[axis] ?? null
    if (matching !== null) matched.push({ axis, coordinate: matching })
    const name = toldName ?? given ?? (matching === null ? null : lastPart(matching))
    const named = name === null ? null : columnOf(name)
    return {
      name,
      length,
      coordinate: toldName === null ? (attached ?? named) : (named ?? attached ?? matching),
    }
  })
  return { axes, open: axes.some(({ name }) => name === null), matched }
}

/** Orders in which the axes of an array may stand, to choose from. */
export function axisOrders(count: number): string[][] {
  const names = ["trajectory", "time", "site"]
  const orders = (length: number, left: readonly string[]): string[][] =>
    length === 0
      ? [[]]
      : left.flatMap((name) =>
          orders(
            length - 1,
            left.filter((other) => other !== name),
          ).map((rest) => [name, ...rest]),
        )
  return count > names.length ? [] : orders(count, names)
}
