import { spawn } from "node:child_process"
import { chmodSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync } from "node:fs"
import path from "node:path"
import { fileURLToPath } from "node:url"
import { ensureBuild } from "./build.mjs"
import { ensureChromium, ensurePostgres } from "./debian.mjs"
import { ensureNode, ensurePackages } from "./packages.mjs"
import { keptSecrets, startPostgres } from "./postgres.mjs"
import { run, say } from "./say.mjs"

const root = fileURLToPath(new URL("..", import.meta.url))
const bin = (name) => path.join(root, "node_modules", ".bin", name)
const chosen = process.argv.slice(2)

/** Static checks: each counts as one test. */
const checks = {
  types: [
    [bin("astro"), ["check", "--minimumFailingSeverity", "error"]],
    [bin("tsc"), ["--noEmit", "-p", "."]],
  ],
  lint: [[bin("eslint"), [".", "--max-warnings", "0"]]],
  format: [[bin("prettier"), ["--check", ".", "--log-level", "warn"]]],
}
const suites = ["unit", "server", "e2e"]
const wanted = (name) => chosen.length === 0 || chosen.includes(name)

function execute(program, args, env) {
  return new Promise((resolve) => {
    const child = spawn(program, args, { cwd: root, env, stdio: ["ignore", "pipe", "pipe"] })
    let output = ""
    for (const stream of [child.stdout, child.stderr]) stream.on("data", (chunk) => (output += chunk))
    child.once("error", (error) => resolve({ ok: false, output: error.message }))
    child.once("exit", (code) => resolve({ ok: code === 0, output }))
  })
}

async function runCheck(name, env) {
  const started = Date.now()
  for (const [program, args] of checks[name]) {
    const { ok, output } = await execute(program, args, env)
    if (ok) continue
    console.log(`\n${output}\n${name}: failed`)
    return { passed: 0, failed: 1, skipped: 0 }
  }
  console.log(`${name}: passed (${Math.round((Date.now() - started) / 1000)} s)`)
  return { passed: 1, failed: 0, skipped: 0 }
}

/** One vitest project; a run that ends without a report counts as a failure. */
async function runSuite(name, env, scratch) {
  const report = path.join(scratch, `${name}.json`)
  const args = [
    "run",
    "--project",
    name,
    "--reporter=default",
    "--reporter=json",
    `--outputFile.json=${report}`,
  ]
  console.log(`\n== ${name}`)
  const child = spawn(bin("vitest"), args, { cwd: root, env, stdio: ["ignore", "inherit", "inherit"] })
  const code = await new Promise((resolve) => child.once("exit", resolve))
  if (!existsSync(report)) return { passed: 0, failed: 1, skipped: 0 }
  const { numPassedTests, numFailedTests, numPendingTests, numFailedTestSuites } = JSON.parse(
    readFileSync(report, "utf8"),
  )
  // A file that cannot be loaded fails without a failed test.
  const failed = Math.max(numFailedTests, code === 0 && numFailedTestSuites === 0 ? 0 : 1)
  return { passed: numPassedTests, failed, skipped: numPendingTests }
}

await run(async () => {
  ensureNode()
  ensurePackages(root)
  const env = {
    ...process.env,
    CI: process.env.CI ?? "true",
    ASTRO_TELEMETRY_DISABLED: "1",
    NO_COLOR: "1",
    FORCE_COLOR: undefined,
  }
  delete env.FORCE_COLOR
  const scratchRoot = path.join(root, ".data")
  mkdirSync(scratchRoot, { recursive: true })
  const scratch = mkdtempSync(path.join(scratchRoot, "test-"))
  // The server's user passes through it to its data; the secrets in it keep their own mode.
  chmodSync(scratch, 0o711)
  const results = []
  let server
  const cleanUp = async () => {
    await server?.stop()
    rmSync(scratch, { recursive: true, force: true })
  }
  for (const signal of ["SIGINT", "SIGTERM"])
    process.on(signal, () => void cleanUp().then(() => process.exit(1)))
  try {
    const needsServer = wanted("server") || wanted("e2e")
    if (needsServer) {
      const programs = ensurePostgres()
      const secrets = keptSecrets(path.join(scratch, "secrets.json"))
      server = await startPostgres({
        programs,
        wanted: path.join(scratch, "postgres"),
        secrets,
        volatile: true,
      })
      env.TEST_DATABASE_OWNER_URL = server.ownerUrl
      env.TEST_DATABASE_URL = server.applicationUrl
    }
    if (wanted("e2e")) env.CHROMIUM = ensureChromium()
    if (needsServer) ensureBuild(root)
    for (const name of Object.keys(checks)) if (wanted(name)) results.push(await runCheck(name, env))
    for (const name of suites) if (wanted(name)) results.push(await runSuite(name, env, scratch))
  } catch (error) {
    say(`\n${error.message}`)
    results.push({ passed: 0, failed: 1, skipped: 0 })
  } finally {
    await cleanUp()
  }
  const sum = (key) => results.reduce((total, result) => total + result[key], 0)
  const skipped = sum("skipped") > 0 ? `, ${sum("skipped")} skipped` : ""
  console.log(`\n${sum("passed")} passed, ${sum("failed")} failed${skipped}`)
  process.exitCode = sum("failed") > 0 || sum("passed") === 0 ? 1 : 0
})
