import { spawnSync } from "node:child_process"
import { existsSync, readFileSync } from "node:fs"
import path from "node:path"
import { say, SetUpError } from "./say.mjs"

const readJson = (file) => JSON.parse(readFileSync(file, "utf8"))

/**
 * Whether node_modules holds what the lockfile says. npm writes its own copy of the lockfile as the last step of an
 * install, so an interrupted one has none, or an older one.
 */
export function packagesAreComplete(root) {
  const installedFile = path.join(root, "node_modules", ".package-lock.json")
  if (!existsSync(installedFile)) return false
  const installed = readJson(installedFile).packages
  const wanted = Object.entries(readJson(path.join(root, "package-lock.json")).packages)
  return wanted.every(([place, entry]) => {
    if (place === "" || entry.link) return true
    const found = installed[place]
    // Optional packages for other systems stay out; one that is here has to have the right version.
    return found
      ? found.version === entry.version
      : entry.optional === true || entry.devOptional === true || entry.peer === true
  })
}

/** Installs the npm packages when they are missing or older than the lockfile. */
export function ensurePackages(root) {
  if (packagesAreComplete(root)) return
  say("Installing the npm packages (a minute or two, once) …")
  const npm = spawnSync("npm", ["ci", "--no-audit", "--no-fund", "--loglevel=error"], {
    cwd: root,
    // npm's own output is not ours: what a command prints on standard output stays clean.
    stdio: ["ignore", 2, 2],
  })
  if (npm.error)
    throw new SetUpError(`npm could not be started (${npm.error.message}). Install Node 20 with npm.`)
  if (npm.status !== 0)
    throw new SetUpError(
      "npm ci failed; its message is above. Once that is mended, run the same command again.",
    )
  if (!packagesAreComplete(root))
    throw new SetUpError(
      "npm ci ended, but packages of package-lock.json are missing. Delete node_modules and try again.",
    )
}

/** Refuses a Node that the packages do not run on. */
export function ensureNode() {
  const [major, minor] = process.versions.node.split(".").map(Number)
  if (major < 20 || (major === 20 && minor < 15))
    throw new SetUpError(
      `This is Node ${process.versions.node}; the product needs Node 20.15 or newer of the 20 line.`,
    )
}
