import { spawn } from "node:child_process"
import path from "node:path"
import { fileURLToPath } from "node:url"
import { ensureNode, ensurePackages } from "./packages.mjs"
import { run } from "./say.mjs"

const root = fileURLToPath(new URL("..", import.meta.url))
const [script, ...args] = process.argv.slice(2)

await run(() => {
  ensureNode()
  ensurePackages(root)
  const tsx = path.join(root, "node_modules/tsx/dist/loader.mjs")
  const environment = { ...process.env, TSX_TSCONFIG_PATH: path.join(root, "tsconfig.json") }
  const child = spawn(process.execPath, ["--import", `file://${tsx}`, path.join(root, script), ...args], {
    stdio: "inherit",
    env: environment,
  })
  for (const signal of ["SIGINT", "SIGTERM"]) process.on(signal, () => child.kill(signal))
  child.on("exit", (code, signal) => {
    process.exitCode = code ?? (signal ? 1 : 0)
  })
})
