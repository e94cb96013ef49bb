import type { Gunzip, InflateRaw } from "node:zlib"

/** Sends pieces through an unpacker, no faster than its output is taken. */
export async function* unpacked(
  pieces: AsyncIterable<Uint8Array>,
  inflater: Gunzip | InflateRaw,
): AsyncIterable<Uint8Array> {
  const feeding = feed(pieces, inflater)
  // A failure to feed destroys the inflater and is thrown by reading from it.
  feeding.catch(() => undefined)
  try {
    yield* inflater as AsyncIterable<Buffer>
    await feeding
  } finally {
    inflater.destroy()
  }
}

async function feed(pieces: AsyncIterable<Uint8Array>, inflater: Gunzip | InflateRaw): Promise<void> {
  try {
    for await (const piece of pieces) {
      if (inflater.destroyed) return
      // The source may use its buffer again, and the inflater keeps what it is given.
      await new Promise<void>((resolve, reject) =>
        inflater.write(Buffer.from(piece), (error) => (error ? reject(error) : resolve())),
      )
    }
    inflater.end()
  } catch (error) {
    inflater.destroy(error as Error)
    throw error
  }
}
