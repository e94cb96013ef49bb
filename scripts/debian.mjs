import { spawnSync } from "node:child_process"
import { existsSync, mkdirSync, readdirSync, writeFileSync } from "node:fs"
import path from "node:path"
import { say, SetUpError } from "./say.mjs"

/** Installs Debian packages, or says how when this is not root. */
function aptInstall(packages, why) {
  const command = `apt-get update && apt-get install -y --no-install-recommends ${packages.join(" ")}`
  if (process.getuid?.() !== 0 || !existsSync("/usr/bin/apt-get"))
    throw new SetUpError(
      `${why} is missing. Install it and run the same command again:\n\n  sudo sh -c '${command}'\n`,
    )
  say(`Installing ${why} from Debian's packages (${packages.join(", ")}) …`)
  const options = { stdio: ["ignore", 2, 2], env: { ...process.env, DEBIAN_FRONTEND: "noninteractive" } }
  // An earlier run that was killed may have left packages half configured.
  spawnSync("dpkg", ["--configure", "-a"], options)
  for (const step of [
    ["update", "-q"],
    ["install", "-y", "-q", "--no-install-recommends", ...packages],
  ]) {
    const apt = spawnSync("apt-get", step, options)
    if (apt.status !== 0)
      throw new SetUpError(
        `apt-get ${step[0]} failed; its message is above. Once that is mended, run the same command again.`,
      )
  }
}

/** Folder of the newest PostgreSQL programs, or undefined. */
function findPostgresPrograms() {
  const root = "/usr/lib/postgresql"
  if (!existsSync(root)) return undefined
  const versions = readdirSync(root).filter((name) => existsSync(path.join(root, name, "bin", "initdb")))
  const newest = versions.sort((a, b) => Number(b) - Number(a))[0]
  return newest && path.join(root, newest, "bin")
}

/** Folder of the PostgreSQL programs; installed when missing, without a cluster of Debian's own. */
export function ensurePostgres() {
  const found = findPostgresPrograms()
  if (found) return found
  if (process.getuid?.() === 0) {
    const folder = "/etc/postgresql-common/createcluster.d"
    mkdirSync(folder, { recursive: true })
    writeFileSync(path.join(folder, "afterquench.conf"), "create_main_cluster = false\n")
  }
  aptInstall(["postgresql"], "PostgreSQL")
  const installed = findPostgresPrograms()
  if (!installed) throw new SetUpError("PostgreSQL was installed, but /usr/lib/postgresql holds no initdb.")
  return installed
}

/** Debian's Chromium; installed when missing. */
export function ensureChromium() {
  const program = "/usr/bin/chromium"
  if (!existsSync(program)) aptInstall(["chromium"], "Chromium")
  return program
}
