import { constants, createGunzip } from "node:zlib"
import { IntakeRefusal } from "../intake-codes"
import type { IntakeLimits } from "../intake-limits"
import type { ByteSource } from "./byte-source"

export const isGzip = (head: Uint8Array): boolean => head[0] === 0x1f && head[1] === 0x8b

/**
 * The unpacked bytes of a gzip file of one or more members. Counts as it goes, so a bomb is stopped at the limit; the
 * checksum and length of every member are checked by zlib.
 *
 * @throws IntakeRefusal gzip-damaged, inflate-limit
 * @see RFC 1952
 */
export async function* gunzipped(source: ByteSource, limits: IntakeLimits): AsyncIterable<Uint8Array> {
  const inflater = createGunzip({ chunkSize: 256 * 1024, finishFlush: constants.Z_FINISH })
  const feeding = feed(source, inflater)
  // The failure is reported through the inflater, which is destroyed with it.
  feeding.catch(() => undefined)
  let bytes = 0
  try {
    for await (const piece of inflater as AsyncIterable<Buffer>) {
      bytes += piece.length
      if (bytes > limits.maxBytes) throw new IntakeRefusal("inflate-limit", { max: limits.maxBytes })
      yield piece
    }
    await feeding
  } catch (error) {
    if (isZlibError(error)) throw new IntakeRefusal("gzip-damaged", { n: bytes })
    throw error
  } finally {
    inflater.destroy()
  }
}

async function feed(source: ByteSource, inflater: ReturnType<typeof createGunzip>): Promise<void> {
  try {
    for await (const piece of source.stream()) {
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

const isZlibError = (error: unknown): boolean =>
  error instanceof Error && "code" in error && String(error.code).startsWith("Z_")
