import type { IntakeCodeName, SentenceValues } from "../intake-codes"
import type { Hdf5Answer, Hdf5Type } from "./hdf5-protocol"
import type { MountedFile } from "./mounted-file"

/**
 * Reads a block of a dataset and checks that the library says it succeeded: its own `value` and `slice` return garbage
 * for damaged chunks.
 *
 * @param offset of the block along each axis
 * @param count of values along each axis
 */
export function readSlab(
  file: MountedFile,
  path: string,
  type: Hdf5Type,
  offset: readonly number[],
  count: readonly number[],
): Hdf5Answer {
  const { library, id } = file
  const values = count.reduce((product, length) => product * length, 1)
  const bytes = values * type.size
  const memory = library._malloc(Math.max(1, bytes))
  if (memory === 0) return failure("hdf5-read")
  try {
    file.takeErrors()
    const scalar = count.length === 0
    const status = library.get_dataset_data(
      id,
      `/${path}`,
      scalar ? null : count.map(BigInt),
      scalar ? null : offset.map(BigInt),
      scalar ? null : count.map(() => 1n),
      BigInt(memory),
    )
    if (status !== 0) return failed(file.takeErrors())
    if (type.kind === "strings") return { texts: stringsAt(file, path, memory, values, count) }
    return { bytes: library.HEAPU8.slice(memory, memory + bytes) }
  } catch (error) {
    return failed(`${file.takeErrors()}${String(error)}`)
  } finally {
    library._free(memory)
  }
}

const failure = (code: IntakeCodeName, values: SentenceValues = {}) => ({ failure: code, values })

/** The error stream names a filter that the library has not. */
function failed(errors: string) {
  const filter = /required filter '([^']{1,80})'/.exec(errors)?.[1]
  return filter ? failure("hdf5-filter", { filter }) : failure("hdf5-read")
}

/** Texts behind an array of pointers; the library allocated them and takes them back. */
function stringsAt(
  { library, id }: MountedFile,
  path: string,
  memory: number,
  values: number,
  count: readonly number[],
): string[] {
  const pointers = new Uint32Array(library.HEAPU8.slice(memory, memory + 4 * values).buffer)
  try {
    return Array.from(pointers, (pointer) => (pointer === 0 ? "" : library.UTF8ToString(pointer)))
  } finally {
    library.reclaim_vlen_memory_count(id, `/${path}`, "", BigInt(memory), count.map(BigInt))
  }
}
