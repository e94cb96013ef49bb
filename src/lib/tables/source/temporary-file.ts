import { mkdtemp, open, rm } from "node:fs/promises"
import os from "node:os"
import path from "node:path"
import type { ByteSource } from "./byte-source"
import { fileSource } from "./file-source"

/** A source that lies on disk under a path of this machine. */
export type FileBacked = ByteSource & { readonly path: string }

export const isFileBacked = (source: ByteSource): source is FileBacked =>
  "path" in source && typeof source.path === "string"

/**
 * Calls `use` with the bytes as a file on disk, for formats that jump about in it, and removes the file afterwards. The
 * file has a name of our own; nothing of the source's name reaches the disk.
 */
export async function withTemporaryFile<Result>(
  name: string,
  pieces: AsyncIterable<Uint8Array>,
  use: (source: FileBacked) => Promise<Result>,
): Promise<Result> {
  const folder = await mkdtemp(path.join(os.tmpdir(), "table-"))
  const filePath = path.join(folder, "table")
  try {
    const file = await open(filePath, "wx", 0o600)
    try {
      for await (const piece of pieces) await file.write(piece)
    } finally {
      await file.close()
    }
    const source = await fileSource(filePath, name)
    try {
      return await use(source)
    } finally {
      await source.close()
    }
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
}
