/**
 * The elements of an array that was stored column by column, in C order, a batch at a time.
 *
 * @param bytes all elements
 * @param size bytes of an element
 * @param perBatch elements of a batch
 */
export function* inMemoryOrder(
  bytes: Uint8Array,
  shape: readonly number[],
  size: number,
  perBatch: number,
): Generator<Uint8Array> {
  // Copied as 32-bit words where possible; as doubles, a pattern that means NaN might change.
  const wide = size % 4 === 0 && bytes.byteOffset % 4 === 0
  const units = wide ? new Uint32Array(bytes.buffer, bytes.byteOffset, bytes.length / 4) : bytes
  const unitsOf = wide ? size / 4 : size
  const steps = shape.map((_, axis) =>
    shape.slice(0, axis).reduce((product, length) => product * length, unitsOf),
  )
  const index = shape.map(() => 0)
  const last = shape.length - 1
  const batchBytes = new Uint8Array(new ArrayBuffer(perBatch * size))
  const batch = wide ? new Uint32Array(batchBytes.buffer) : batchBytes
  let from = 0
  let filled = 0
  for (let left = bytes.length / size; left > 0; left--) {
    for (let unit = 0; unit < unitsOf; unit++) batch[filled * unitsOf + unit] = units[from + unit]!
    if (++filled === perBatch || left === 1) {
      yield batchBytes.subarray(0, filled * size)
      filled = 0
    }
    for (let axis = last; axis >= 0; axis--) {
      from += steps[axis]!
      if (++index[axis]! < shape[axis]!) break
      from -= steps[axis]! * shape[axis]!
      index[axis] = 0
    }
  }
}
