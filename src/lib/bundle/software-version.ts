import { createHash } from "node:crypto"
import { existsSync, readFileSync } from "node:fs"
import path from "node:path"
import { fileURLToPath } from "node:url"
import type { RecordedSoftware } from "./draft-record"

/** The checkout's folder, found upwards from this file, which may be bundled into dist/. */
function rootFolder(): string {
  let folder = path.dirname(fileURLToPath(import.meta.url))
  while (!existsSync(path.join(folder, "package-lock.json"))) {
    const parent = path.dirname(folder)
    if (parent === folder) throw new Error("package-lock.json is not in any folder above the program.")
    folder = parent
  }
  return folder
}

let known: RecordedSoftware | undefined

/** This program and the packages it runs with. */
export function softwareVersion(): RecordedSoftware {
  if (known) return known
  const root = rootFolder()
  const { version } = JSON.parse(readFileSync(path.join(root, "package.json"), "utf8")) as { version: string }
  const lockfile = readFileSync(path.join(root, "package-lock.json"))
  known = {
    name: "afterquench",
    version,
    lockfileSha256: createHash("sha256").update(lockfile).digest("hex"),
    node: process.versions.node,
    zlib: process.versions.zlib ?? "unknown",
  }
  return known
}
