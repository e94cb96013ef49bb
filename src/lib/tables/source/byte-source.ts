/**
 * A file to read, several times if need be. A piece that `stream` yields is only valid until the next is asked for, so
 * that a source may reuse its buffer.
 */
export interface ByteSource {
  readonly name: string
  /** Bytes. */
  readonly size: number
  stream(from?: number): AsyncIterable<Uint8Array>
  /** Exactly `length` bytes, fewer only at the end of the file. */
  read(offset: number, length: number): Promise<Uint8Array>
}

const PIECE = 256 * 1024

/** A file that is already in memory. */
export function bytesSource(name: string, bytes: Uint8Array): ByteSource {
  return {
    name,
    size: bytes.length,
    async *stream(from = 0) {
      for (let at = from; at < bytes.length; at += PIECE) yield bytes.subarray(at, at + PIECE)
    },
    read: (offset, length) => Promise.resolve(bytes.subarray(offset, offset + length)),
  }
}
