import { spawnSync } from "node:child_process"
import { createHash } from "node:crypto"
import { existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs"
import path from "node:path"
import { say, SetUpError } from "./say.mjs"

const sources = ["src", "figure-specs", "migrations", "public", "scripts"]
const files = ["package-lock.json", "astro.config.mjs", "tsconfig.json", "auth.config.ts"]

function* walk(folder) {
  for (const entry of readdirSync(folder, { withFileTypes: true })) {
    const file = path.join(folder, entry.name)
    if (entry.isDirectory()) yield* walk(file)
    else if (!/\.(test\.tsx?|golden\.\w+|md)$/.test(entry.name)) yield file
  }
}

/** One checksum over everything that the build depends on. */
function sourcesChecksum(root) {
  const hash = createHash("sha256")
  const all = [
    ...sources.flatMap((folder) => [...walk(path.join(root, folder))]),
    ...files.map((file) => path.join(root, file)),
  ]
  for (const file of all.filter((name) => existsSync(name)).sort())
    hash.update(path.relative(root, file)).update("\0").update(readFileSync(file)).update("\0")
  return hash.digest("hex")
}

/** Builds the site and its programs when their sources have changed since the last build. */
export function ensureBuild(root) {
  const stampFile = path.join(root, "dist", ".build-stamp")
  const checksum = sourcesChecksum(root)
  if (existsSync(stampFile) && readFileSync(stampFile, "utf8") === checksum) return
  say("Building …")
  rmSync(stampFile, { force: true })
  const built = spawnSync(process.execPath, [path.join(root, "node_modules/astro/astro.js"), "build"], {
    cwd: root,
    encoding: "utf8",
    env: { ...process.env, ASTRO_TELEMETRY_DISABLED: "1", NODE_ENV: "production" },
  })
  if (built.status !== 0) throw new SetUpError(`The build failed:\n${built.stdout}\n${built.stderr}`)
  writeFileSync(stampFile, checksum)
}
