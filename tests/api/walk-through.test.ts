import { execFile } from "node:child_process"
import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs"
import os from "node:os"
import path from "node:path"
import { promisify } from "node:util"
import { afterAll, beforeAll, expect, test } from "vitest"
import { createDb } from "@/lib/server/db/client"
import { createPool } from "@/lib/server/db/create-pool"
import { withToken } from "@tests/support/callers"
import { insertPerson } from "@tests/support/one-of-everything"
import { startApp, type RunningApp } from "@tests/support/start-app"
import { logTimes } from "../../scripts/simulate/log-times"
import { simulateAnnihilation } from "../../scripts/simulate/pair-annihilation"

let app: RunningApp
let folder: string
let token: string

beforeAll(async () => {
  app = await startApp({}, { worker: true, mail: true })
  folder = mkdtempSync(path.join(os.tmpdir(), "afterquench-walk-"))
  const db = createDb(createPool(app.database.appUrl, 1))
  const { headers } = await withToken(db, await insertPerson(db, "Ilse Brandvold"), "all")
  await db.destroy()
  token = (headers["authorization"] ?? "").replace("Bearer ", "")
  const times = [0, ...logTimes(0.1, 1000, 20)]
  const rows = simulateAnnihilation({ sites: 1000, trajectories: 60, rate: 1, times, seed: 3 }).flatMap(
    (density, run) => times.map((t, k) => `${run + 1},${t},${density[k]}`),
  )
  writeFileSync(path.join(folder, "run.csv"), `run,t [1/J],n\n${rows.join("\n")}\n`)
})
afterAll(async () => {
  await app?.stop()
  if (folder) rmSync(folder, { recursive: true, force: true })
})

test("the walk-through of docs/api.md does what it says, and its bundle verifies", async () => {
  const text = readFileSync(new URL("../../docs/api.md", import.meta.url), "utf8")
  const script = [...text.matchAll(/^```sh\n([\s\S]*?)^```/gm)].map(([, block]) => block).join("\n")
  expect(script).toContain("/lock")
  writeFileSync(path.join(folder, "walk.sh"), script)
  const { stdout } = await promisify(execFile)("bash", ["walk.sh"], {
    cwd: folder,
    env: { ...process.env, URL: app.url, TOKEN: token },
    timeout: 120_000,
  })
  const lines = stdout.trim().split("\n")
  expect(lines).toContain("run: trajectory, t: time, n: observable")
  expect(lines).toContain("accepted")
  expect(lines).toContain("Ilse Brandvold")
  expect(lines.at(-1)).toBe("locked")
  expect(statSync(path.join(folder, "figure.pdf")).size).toBeGreaterThan(1000)
  // Exit code 0: every checksum holds, every number and figure is the same again.
  await promisify(execFile)(
    process.execPath,
    ["scripts/run-ts.mjs", "scripts/verify.ts", path.join(folder, "bundle.zip")],
    { maxBuffer: 1 << 24 },
  )
}, 180_000)
