import { type FileHandle, open } from "node:fs/promises"
import path from "node:path"
import type { ByteSource } from "./byte-source"

const PIECE = 512 * 1024

/**
 * A file on disk, read through one descriptor. Close it when done.
 *
 * @param name what the user calls the file; the last part of the path by default
 */
export async function fileSource(
  filePath: string,
  name = path.basename(filePath),
): Promise<ByteSource & { readonly path: string; close(): Promise<void> }> {
  const file = await open(filePath, "r")
  const { size } = await file.stat()
  return {
    name,
    size,
    path: filePath,
    async *stream(from = 0) {
      const buffer = Buffer.allocUnsafeSlow(PIECE)
      for (let at = from; at < size;) {
        const { bytesRead } = await file.read(buffer, 0, PIECE, at)
        if (bytesRead === 0) return
        at += bytesRead
        yield buffer.subarray(0, bytesRead)
      }
    },
    read: (offset, length) => readExactly(file, offset, Math.min(length, size - offset)),
    close: () => file.close(),
  }
}

async function readExactly(file: FileHandle, offset: number, length: number): Promise<Uint8Array> {
  const buffer = Buffer.allocUnsafeSlow(Math.max(0, length))
  let at = 0
  while (at < length) {
    const { bytesRead } = await file.read(buffer, at, length - at, offset + at)
    if (bytesRead === 0) break
    at += bytesRead
  }
  return buffer.subarray(0, at)
}
