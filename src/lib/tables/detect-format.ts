import type { ByteSource } from "./source/byte-source"

export type ContentFormat = "text" | "npy" | "zip" | "hdf5" | "parquet" | "gzip" | "json-lines"

const HDF5 = Buffer.from("\x89HDF\r\n\x1a\n", "latin1")
const HEAD = 4096

const startsWith = (bytes: Uint8Array, text: string): boolean =>
  Buffer.from(bytes.subarray(0, text.length)).toString("latin1") === text

/** What the first bytes say; HDF5 may begin later and Parquet ends with its mark as well. */
export function formatOfHead(head: Uint8Array): ContentFormat {
  if (startsWith(head, "\x93NUMPY")) return "npy"
  if (startsWith(head, "PK\x03\x04") || startsWith(head, "PK\x05\x06")) return "zip"
  if (startsWith(head, "PAR1")) return "parquet"
  if (startsWith(head, "\x1f\x8b")) return "gzip"
  for (let at = 0; at + HDF5.length <= head.length; at = at === 0 ? 512 : at * 2)
    if (HDF5.equals(head.subarray(at, at + HDF5.length))) return "hdf5"
  return looksLikeJson(head) ? "json-lines" : "text"
}

/** A first line that begins like an object with a quoted key. */
const looksLikeJson = (head: Uint8Array): boolean =>
  /^(?:\xef\xbb\xbf)?\s*\{\s*"(?:[^"\\\r\n]|\\.)*"\s*:/.test(Buffer.from(head).toString("latin1"))

/**
 * What the content says, whatever the name says. A user block of any power of two may precede HDF5.
 *
 * @see HDF5 File Format Specification 3.0, section II.A
 */
export async function detectFormat(source: ByteSource): Promise<ContentFormat> {
  const format = formatOfHead(await source.read(0, HEAD))
  if (format !== "text") return format
  for (let at = HEAD; at < source.size; at *= 2)
    if (HDF5.equals(await source.read(at, HDF5.length))) return "hdf5"
  return format
}

const formatsOfEndings = new Map<string, readonly string[]>([
  ...["csv", "tsv", "tab", "txt", "dat", "asc"].map((ending) => [ending, ["text"]] as const),
  ["npy", ["npy"]],
  ["npz", ["npz"]],
  ...["h5", "hdf5", "he5", "nc"].map((ending) => [ending, ["hdf5"]] as const),
  ...["parquet", "pq"].map((ending) => [ending, ["parquet"]] as const),
  ...["jsonl", "ndjson"].map((ending) => [ending, ["json-lines"]] as const),
])

/** The format that a file's name promises, when it is another than the one that was read; else null. */
export function otherFormatInName(name: string, format: string): string | null {
  const ending = /\.([a-z0-9]+)$/.exec(name.toLowerCase().replace(/\.gz$/, ""))?.[1] ?? ""
  const promised = formatsOfEndings.get(ending)
  return promised && !promised.includes(format) ? ending : null
}
