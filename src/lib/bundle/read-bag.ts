import { createHash } from "node:crypto"
import { unzipSync } from "fflate"

/** One statement of a verification. */
export interface CheckItem {
  readonly item: string
  readonly ok: boolean
  readonly detail: string
}

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex")

/** Files of a bag by their paths; none when the ZIP itself is damaged. */
export function unpack(zip: Uint8Array): ReadonlyMap<string, Uint8Array> | Error {
  try {
    return new Map(Object.entries(unzipSync(zip)).filter(([path]) => !path.endsWith("/")))
  } catch (error) {
    return error as Error
  }
}

function readManifest(bytes: Uint8Array | undefined): ReadonlyMap<string, string> {
  const lines = bytes ? new TextDecoder().decode(bytes).split("\n").filter(Boolean) : []
  return new Map(lines.map((line) => [line.slice(66), line.slice(0, 64)]))
}

/** Every checksum of a bag, both ways: no file changed, none missing, none added. @see RFC 8493, section 3 */
export function checkBag(files: ReadonlyMap<string, Uint8Array>): readonly CheckItem[] {
  const items: CheckItem[] = []
  const check = (item: string, ok: boolean, detail: string) => items.push({ item, ok, detail })
  const manifest = readManifest(files.get("manifest-sha256.txt"))
  const tags = readManifest(files.get("tagmanifest-sha256.txt"))
  check(
    "bagit.txt",
    files.has("bagit.txt"),
    files.has("bagit.txt") ? "present" : "missing: this is not a bag",
  )
  for (const [path, expected] of [...tags, ...manifest]) {
    const bytes = files.get(path)
    if (!bytes) check(path, false, "named in a manifest, but missing")
    else if (sha256(bytes) !== expected)
      check(path, false, "its bytes do not have the checksum of the manifest")
    else check(path, true, "checksum holds")
  }
  for (const path of files.keys())
    if (path.startsWith("data/") && !manifest.has(path)) check(path, false, "present, but in no manifest")
  if (manifest.size === 0) check("manifest-sha256.txt", false, "missing or empty")
  return items
}
