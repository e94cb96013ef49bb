import type { Hdf5Type } from "./hdf5-protocol"

/** Values of one block, so that neither process holds much at a time. */
const MOST_VALUES = 2_000_000
const MOST_TEXTS = 16_384
const MOST_BYTES = 32 * 1024 * 1024

export interface Slab {
  readonly offset: readonly number[]
  readonly count: readonly number[]
}

/**
 * Cuts an array into blocks in C order: whole inner axes, a range of one axis, single steps of the outer ones. Ranges
 * begin at the borders of the chunks where a block holds one, so that no chunk is unpacked twice.
 */
export function* slabs(
  shape: readonly number[],
  chunks: readonly number[] | null,
  type: Hdf5Type,
): Generator<Slab> {
  const most = Math.max(
    1,
    Math.min(type.kind === "strings" ? MOST_TEXTS : MOST_VALUES, Math.floor(MOST_BYTES / type.size)),
  )
  if (shape.length === 0) {
    yield { offset: [], count: [] }
    return
  }
  const inner = (axis: number) => shape.slice(axis + 1).reduce((product, length) => product * length, 1)
  const axis = Math.max(
    0,
    shape.findIndex((_, index) => inner(index) <= most),
  )
  const fits = Math.max(1, Math.floor(most / inner(axis)))
  const chunk = chunks?.[axis] ?? 1
  const step = fits >= chunk ? fits - (fits % chunk) : fits
  const outer = shape.slice(0, axis)
  const index = outer.map(() => 0)
  for (let left = outer.reduce((product, length) => product * length, 1); left > 0; left--) {
    for (let start = 0; start < shape[axis]!; start += step)
      yield {
        offset: [...index, start, ...shape.slice(axis + 1).map(() => 0)],
        count: [...outer.map(() => 1), Math.min(step, shape[axis]! - start), ...shape.slice(axis + 1)],
      }
    for (let at = axis - 1; at >= 0 && ++index[at]! === shape[at]; at--) index[at] = 0
  }
}
