import { createHash } from "node:crypto"
import { Readable } from "node:stream"
import { ZipFile } from "yazl"
import type { BundleFile } from "./bundle-files"

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex")

/** In local time, because a ZIP writes local time: the same fields wherever it is made. */
const fixedTime = new Date(1980, 0, 1)
const options = { mtime: fixedTime, mode: 0o100644, forceDosTimestamp: true } as const

/** The tag files of a bag around its payload. @see RFC 8493, sections 2.1 and 2.2 */
export function bagFiles(
  payload: readonly BundleFile[],
  info: Readonly<Record<string, string>>,
): BundleFile[] {
  const entries = payload.map((file) =>
    "bytes" in file
      ? { path: `data/${file.path}`, size: file.bytes.length, sha256: sha256(file.bytes) }
      : { path: `data/${file.path}`, size: file.size, sha256: file.sha256 },
  )
  const octets = entries.reduce((sum, entry) => sum + entry.size, 0)
  const lines = (record: Readonly<Record<string, string>>) =>
    Object.entries(record)
      .map(([key, value]) => `${key}: ${value.replace(/\s+/g, " ")}\n`)
      .join("")
  const tag = (path: string, content: string) => ({ path, bytes: new TextEncoder().encode(content) })
  const tags = [
    tag("bag-info.txt", lines({ ...info, "Payload-Oxum": `${octets}.${entries.length}` })),
    tag("bagit.txt", "BagIt-Version: 1.0\nTag-File-Character-Encoding: UTF-8\n"),
    tag("manifest-sha256.txt", entries.map((entry) => `${entry.sha256}  ${entry.path}\n`).join("")),
  ]
  const manifest = tags.map(({ path, bytes }) => `${sha256(bytes)}  ${path}\n`).join("")
  return [...tags, tag("tagmanifest-sha256.txt", manifest)]
}

/**
 * A bag as a ZIP: entries in order, fixed times and modes, so that the same content is the same bytes. Streamed: a file is
 * asked for its bytes when its turn comes.
 */
export function writeBag(
  payload: readonly BundleFile[],
  info: Readonly<Record<string, string>>,
): AsyncIterable<Uint8Array> {
  const zip = new ZipFile()
  const inBag = payload.map((file) => ({ ...file, path: `data/${file.path}` }))
  for (const file of [...bagFiles(payload, info), ...inBag]) {
    if ("bytes" in file) zip.addBuffer(Buffer.from(file.bytes), file.path, { ...options, compress: true })
    else
      zip.addReadStreamLazy(file.path, { ...options, compress: true, size: file.size }, (done) =>
        done(null, Readable.from(file.stream())),
      )
  }
  zip.end()
  return zip.outputStream as unknown as AsyncIterable<Uint8Array>
}
