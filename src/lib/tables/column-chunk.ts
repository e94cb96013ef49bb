import type { ColumnDescription } from "./table-reading"

/** Up to 65,536 values of a number or boolean column. Arrays are only valid until the sink's promise resolves. */
export interface NumberChunk {
  readonly kind: "number"
  readonly rows: number
  /** NaN where missing; `valid` tells missing from NaN. */
  readonly values: Float64Array
  /** One bit a row, lowest bit first; null when every row has a value. */
  readonly valid: Uint8Array | null
  /** Over finite values; null when there are none. */
  readonly min: number | null
  readonly max: number | null
  /** Cells that say NaN; missing cells are not counted. */
  readonly nanCount: number
}

/** Up to 65,536 texts of a text or datetime column: rows + 1 offsets into UTF-8 bytes. */
export interface TextChunk {
  readonly kind: "text"
  readonly rows: number
  readonly offsets: Uint32Array
  readonly bytes: Uint8Array
  readonly valid: Uint8Array | null
}

export type ColumnChunk = NumberChunk | TextChunk

/** Takes the columns as they are read. Both calls are awaited, so a slow sink slows the reading down. */
export interface ColumnSink {
  /**
   * Called before the first chunk; called AGAIN when the whole file contradicts what its sample promised. Everything
   * received before is then void.
   */
  start(columns: readonly ColumnDescription[]): void | Promise<void>
  /** Parts of a column come in order from 0; all but the last have 65,536 rows. */
  chunk(columnIndex: number, part: number, data: ColumnChunk): void | Promise<void>
}

const littleEndian = new Uint8Array(new Uint16Array([1]).buffer)[0] === 1

/**
 * A chunk as stored bytes: little-endian doubles, or little-endian uint32 offsets followed by UTF-8. A view on the
 * chunk's own memory where possible: copy it to keep it.
 */
export function chunkBytes(chunk: ColumnChunk): Uint8Array {
  if (!littleEndian) throw new Error("Columns are stored from little-endian machines only.")
  if (chunk.kind === "number")
    return new Uint8Array(chunk.values.buffer, chunk.values.byteOffset, chunk.values.byteLength)
  const { offsets, bytes } = chunk
  const stored = new Uint8Array(offsets.byteLength + bytes.length)
  stored.set(new Uint8Array(offsets.buffer, offsets.byteOffset, offsets.byteLength))
  stored.set(bytes, offsets.byteLength)
  return stored
}

/** The texts of a stored text chunk; null where missing. */
export function textsOfBytes(stored: Uint8Array, rows: number, valid: Uint8Array | null): (string | null)[] {
  const view = new DataView(stored.buffer, stored.byteOffset, stored.byteLength)
  const texts = stored.subarray((rows + 1) * 4)
  const decoder = new TextDecoder()
  return Array.from({ length: rows }, (_, row) =>
    isValid(valid, row)
      ? decoder.decode(texts.subarray(view.getUint32(row * 4, true), view.getUint32(row * 4 + 4, true)))
      : null,
  )
}

/** Whether a row holds a value. */
export const isValid = (valid: Uint8Array | null, row: number): boolean =>
  valid === null || (valid[row >> 3]! & (1 << (row & 7))) !== 0
