import fs from "node:fs"
// The plain build: it sees no file of this machine but the one mounted here. The package's Node build would follow
// external links and storage to any path.
import h5wasm, { type Group, type Module as H5Module, ready } from "h5wasm"

export type Hdf5Library = typeof H5Module

export interface MountedFile {
  readonly library: Hdf5Library
  readonly id: bigint
  readonly root: Group
  /** What the library wrote to its error stream since the last call. */
  takeErrors(): string
}

const MOUNT = "table.h5"
const MOST_ERRORS = 64 * 1024

/** The parts of the virtual file system that a mount replaces; the package does not type them. */
interface VirtualNode {
  contents: Uint8Array
  usedBytes: number
  stream_ops: Record<string, unknown>
  node_ops: Record<string, unknown>
}

/**
 * Opens an HDF5 file through one read-only descriptor: the library asks for pieces, and no copy of the file is made.
 *
 * @returns null when the library cannot open it
 */
export async function mountFile(filePath: string): Promise<MountedFile | null> {
  const library = await ready
  const descriptor = fs.openSync(filePath, "r")
  const { size } = fs.fstatSync(descriptor)
  const files = library.FS as unknown as {
    createFile(parent: string, name: string, properties: object, read: boolean, write: boolean): VirtualNode
    ErrnoError: new (errno: number) => Error
    getStream(descriptor: number): { stream_ops: Record<string, unknown> }
  }
  const node = files.createFile("/", MOUNT, {}, true, false)
  node.contents = new Uint8Array(0)
  node.usedBytes = size
  node.stream_ops = {
    ...node.stream_ops,
    read: (_stream: unknown, heap: Uint8Array, offset: number, length: number, position: number) => {
      const wanted = Math.min(length, size - position)
      if (wanted <= 0) return 0
      return fs.readSync(
        descriptor,
        new Uint8Array(heap.buffer, heap.byteOffset + offset, wanted),
        0,
        wanted,
        position,
      )
    },
    write: () => {
      throw new files.ErrnoError(29)
    },
    llseek: (stream: { position: number }, offset: number, whence: number) =>
      whence === 1 ? offset + stream.position : whence === 2 ? offset + size : offset,
  }
  const attributes = node.node_ops.getattr as (node: VirtualNode) => { size: number }
  node.node_ops = { ...node.node_ops, getattr: (of: VirtualNode) => ({ ...attributes(of), size }) }
  let errors = ""
  const errorStream = files.getStream(2)
  errorStream.stream_ops = {
    ...errorStream.stream_ops,
    write: (_stream: unknown, heap: Uint8Array, offset: number, length: number) => {
      if (errors.length < MOST_ERRORS)
        errors += Buffer.from(heap.subarray(offset, offset + length)).toString("latin1")
      return length
    },
  }
  const file = new h5wasm.File(`/${MOUNT}`, "r")
  if (file.file_id < 0n) return null
  return {
    library,
    id: file.file_id,
    root: file,
    takeErrors() {
      const taken = errors
      errors = ""
      return taken
    },
  }
}
