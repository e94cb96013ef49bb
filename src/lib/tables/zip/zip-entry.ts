import { createInflateRaw, crc32 } from "node:zlib"
import { IntakeRefusal } from "../intake-codes"
import type { ByteSource } from "../source/byte-source"
import { unpacked } from "../source/unpacked"
import type { ZipEntry } from "./zip-directory"

/** Whether an entry's name stays inside the archive; it is never used as a path all the same. */
export const isInside = (name: string): boolean =>
  !/^[/\\]|^[A-Za-z]:|\\|\0/.test(name) && !name.split("/").includes("..")

/**
 * The bytes of an entry. Its length and checksum are compared with the directory; a difference ends the reading.
 *
 * @throws IntakeRefusal zip-damaged
 */
export async function* entryBytes(source: ByteSource, entry: ZipEntry): AsyncIterable<Uint8Array> {
  const packed = packedBytes(source, entry)
  const pieces = entry.method === 0 ? packed : unpacked(packed, createInflateRaw({ chunkSize: 256 * 1024 }))
  const damaged = () => new IntakeRefusal("zip-damaged", { place: entry.name }, entry.name)
  let length = 0
  let sum = 0
  try {
    for await (const piece of pieces) {
      length += piece.length
      if (length > entry.size) throw damaged()
      sum = crc32(piece, sum)
      yield piece
    }
  } catch (error) {
    if (error instanceof Error && "code" in error && String(error.code).startsWith("Z_")) throw damaged()
    throw error
  }
  if (length !== entry.size || sum !== entry.crc) throw damaged()
}

async function* packedBytes(source: ByteSource, { dataAt, packedSize }: ZipEntry): AsyncIterable<Uint8Array> {
  let left = packedSize
  if (left === 0) return
  for await (const piece of source.stream(dataAt)) {
    yield piece.subarray(0, Math.min(left, piece.length))
    left -= piece.length
    if (left <= 0) return
  }
}
