import { createGunzip } from "node:zlib"
import { IntakeRefusal } from "../intake-codes"
import type { IntakeLimits } from "../intake-limits"
import type { ByteSource } from "./byte-source"
import { unpacked } from "./unpacked"

export const isGzip = (head: Uint8Array): boolean => head[0] === 0x1f && head[1] === 0x8b

/**
 * The unpacked bytes of a gzip file of one or more members. Counts as it goes, so a bomb is stopped at the limit; zlib
 * checks the sum and length of every member.
 *
 * @throws IntakeRefusal gzip-damaged, inflate-limit
 * @see RFC 1952
 */
export async function* gunzipped(source: ByteSource, limits: IntakeLimits): AsyncIterable<Uint8Array> {
  let bytes = 0
  try {
    for await (const piece of unpacked(source.stream(), createGunzip({ chunkSize: 256 * 1024 }))) {
      bytes += piece.length
      if (bytes > limits.maxBytes) throw new IntakeRefusal("inflate-limit", { max: limits.maxBytes })
      yield piece
    }
  } catch (error) {
    if (error instanceof Error && "code" in error && String(error.code).startsWith("Z_"))
      throw new IntakeRefusal("gzip-damaged", { n: bytes })
    throw error
  }
}
