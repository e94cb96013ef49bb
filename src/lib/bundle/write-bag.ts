import { createHash } from "node:crypto"
import { Readable } from "node:stream"
import { ZipFile } from "yazl"
import { type BundleFile, bundleFiles } from "./bundle-files"
import { bagName } from "./bundle-paths"
import type { BundleContent } from "./draft-record"

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex")

/** In local time, because a ZIP writes local time: the same fields wherever it is made. */
const fixedTime = new Date(1980, 0, 1)
const options = { mtime: fixedTime, mode: 0o100644, forceDosTimestamp: true, compress: true } as const

/** What bag-info.txt says besides the number of bytes and files. */
const bagInfo = ({ record, software }: BundleContent): Readonly<Record<string, string>> => ({
  "Source-Organization": record.people.map((person) => person.name).join(", "),
  "External-Description": `${record.manuscript.title}, ${record.draft.title}`,
  "External-Identifier": record.draft.digest,
  "Bagging-Date": record.draft.lockedAt.slice(0, 10),
  "Bag-Software-Agent": `${software.name} ${software.version}`,
})

/** The tag files of a bag around its payload. @see RFC 8493, sections 2.1 and 2.2 */
export function tagFiles(
  payload: readonly BundleFile[],
  info: Readonly<Record<string, string>>,
): readonly { readonly path: string; readonly bytes: Uint8Array }[] {
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
 * The bundle of a locked draft: a bag as a ZIP with one folder at its top, entries in order, fixed times and modes, so
 * that the same content is the same bytes. Streamed: an original is asked for its bytes when its turn comes.
 */
export function writeBundle(content: BundleContent): AsyncIterable<Uint8Array> {
  const payload = bundleFiles(content)
  const folder = bagName(content.record)
  const zip = new ZipFile()
  // A file that cannot be read ends the archive with its error, not the process.
  zip.on("error", (error: Error) => (zip.outputStream as Readable).destroy(error))
  for (const { path, bytes } of tagFiles(payload, bagInfo(content)))
    zip.addBuffer(Buffer.from(bytes), `${folder}/${path}`, options)
  for (const file of payload) {
    const path = `${folder}/data/${file.path}`
    if ("bytes" in file) zip.addBuffer(Buffer.from(file.bytes), path, options)
    else
      zip.addReadStreamLazy(path, { ...options, size: file.size }, (done) =>
        done(null, Readable.from(file.stream())),
      )
  }
  zip.end()
  return zip.outputStream as Readable
}
