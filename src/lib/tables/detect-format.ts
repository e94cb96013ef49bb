import type { ByteSource } from "./source/byte-source"
import type { TableFormat } from "./table-reading"

/** What the content says, whatever the name says. */
export async function detectFormat(_source: ByteSource): Promise<TableFormat> {
  return "text"
}
