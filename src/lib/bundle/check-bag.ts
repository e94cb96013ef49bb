import { createHash } from "node:crypto"
import { createReadStream } from "node:fs"
import { readFile } from "node:fs/promises"
import { pipeline } from "node:stream/promises"
import type { UnpackedBag } from "./unpack-bag"

/** One statement of a verification. What another version of the product made may not be comparable byte by byte. */
export interface CheckItem {
  readonly item: string
  /** Nothing fails here. */
  readonly ok: boolean
  readonly outcome: "holds" | "fails" | "not-compared"
  readonly detail: string
}
export type AddItem = (item: string, outcome: CheckItem["outcome"], detail: string) => void

async function sha256Of(file: string): Promise<string> {
  const hash = createHash("sha256")
  await pipeline(createReadStream(file), hash)
  return hash.digest("hex")
}

/** The lines of a manifest; null for a file that is none. */
async function readManifest(file: string | undefined): Promise<ReadonlyMap<string, string> | null> {
  if (file === undefined) return null
  const lines = (await readFile(file, "utf8")).split("\n").filter(Boolean)
  const parsed = lines.map((line) => /^([0-9a-f]{64}) {2}(.+)$/.exec(line))
  return parsed.every((match) => match !== null)
    ? new Map(parsed.map((match) => [match[2]!, match[1]!]))
    : null
}

/**
 * Every checksum of a bag, both ways: no file changed, none missing, none added.
 *
 * @returns the checksum of each payload file as it is, by its path
 * @see RFC 8493, section 3
 */
export async function checkBag(bag: UnpackedBag, add: AddItem): Promise<ReadonlyMap<string, string>> {
  const actual = new Map<string, string>()
  for (const name of ["tagmanifest-sha256.txt", "manifest-sha256.txt"]) {
    const manifest = await readManifest(bag.files.get(name))
    if (manifest === null) {
      add(name, "fails", "missing, or not a manifest: this is no bag of SHA-256 checksums")
      continue
    }
    for (const [path, expected] of manifest) {
      const file = bag.files.get(path)
      const found = file && (await sha256Of(file))
      if (found) actual.set(path, found)
      if (!found) add(path, "fails", "named in a manifest, but missing")
      else if (found === expected) add(path, "holds", "the checksum of the manifest")
      else add(path, "fails", "its bytes do not have the checksum of the manifest")
    }
  }
  for (const path of bag.files.keys())
    if (!actual.has(path) && path !== "tagmanifest-sha256.txt")
      add(path, "fails", "present, but in no manifest")
  return actual
}
