import { decodeValue } from "./decode-value"
import { describeType } from "./describe-type"
import type { MountedFile } from "./mounted-file"

const MOST_VALUES = 64
const MOST_BYTES = 64 * 1024
const MOST_TEXT = 4096

/**
 * An attribute as text, several values joined by commas; null when there is none, or when it is too large or of a kind
 * that is no text or number.
 */
export function attributeText(file: MountedFile, path: string, name: string): string | null {
  const { library, id } = file
  const object = `/${path}`
  if (!library.get_attribute_names(id, object).includes(name)) return null
  const metadata = library.get_attribute_metadata(id, object, name)
  const values = metadata.total_size
  const bytes = values * metadata.size
  if (metadata.shape === null || values === 0 || values > MOST_VALUES || bytes > MOST_BYTES) return null
  const type = describeType(library, metadata)
  if (type.kind === "unread" || type.kind === "compound") return null
  const memory = library._malloc(bytes)
  if (memory === 0) return null
  try {
    if (library.get_attribute_data(id, object, name, BigInt(memory)) !== 0) return null
    const read = library.HEAPU8.slice(memory, memory + bytes)
    const texts = Array.from({ length: values }, (_, index) => {
      if (type.kind !== "strings") return decodeValue(type, read, index * type.size)
      const pointer = new DataView(read.buffer).getUint32(index * 4, true)
      return pointer === 0 ? "" : library.UTF8ToString(pointer)
    })
    if (type.kind === "strings") library.reclaim_vlen_memory(id, object, name, BigInt(memory))
    return texts.join(", ").slice(0, MOST_TEXT)
  } finally {
    library._free(memory)
  }
}
