import type { TrajectoryPrints } from "./compare-versions"
import type { CellValue } from "./table-reading"

/** A column in memory: numbers with NaN where missing, or texts. */
export type PrintedColumn = Float64Array | readonly string[]

const PRIME = 0x01000193
const encoder = new TextEncoder()

/**
 * A fingerprint of every trajectory's rows, so that two versions of a dataset can be compared trajectory by trajectory
 * without holding both in memory. Two different trajectories share one by chance in 2^64 cases once.
 *
 * @param trajectories the column that names the trajectory of each row
 * @param columns the others, in an order that both versions agree on
 * @see G. Fowler, L. C. Noll, K.-P. Vo: FNV-1a, here twice with 32 bits and different starts
 */
export function trajectoryPrints(
  trajectories: PrintedColumn,
  columns: readonly PrintedColumn[],
): TrajectoryPrints {
  const states = new Map<CellValue, Uint32Array>()
  const hashers = columns.map(hasherOf)
  for (let row = 0; row < trajectories.length; row++) {
    const name = trajectories[row]!
    let state = states.get(name)
    if (!state) states.set(name, (state = Uint32Array.of(0x811c9dc5, 0x9dc5811c)))
    for (const hasher of hashers) hasher(state, row)
  }
  return new Map([...states].map(([name, [a, b]]) => [name, `${a!.toString(16)}-${b!.toString(16)}`]))
}

type Hasher = (state: Uint32Array, row: number) => void

function hasherOf(column: PrintedColumn): Hasher {
  if (!(column instanceof Float64Array))
    return (state, row) => {
      for (const byte of encoder.encode(column[row])) mix(state, byte)
      mix(state, 0xff)
    }
  const words = new Uint32Array(column.buffer, column.byteOffset, column.length * 2)
  return (state, row) => {
    mix(state, words[row * 2]!)
    mix(state, words[row * 2 + 1]!)
  }
}

function mix(state: Uint32Array, word: number): void {
  state[0] = Math.imul(state[0]! ^ word, PRIME)
  state[1] = Math.imul((state[1]! ^ word) + 0x9e3779b9, PRIME)
}
