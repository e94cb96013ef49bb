import { execFile } from "node:child_process"
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs"
import os from "node:os"
import path from "node:path"
import { promisify } from "node:util"
import AxeBuilder from "@axe-core/playwright"
import type { Browser, Page } from "playwright-core"
import { afterAll, beforeAll, describe, expect, test } from "vitest"
import { hashPassword } from "@/lib/server/auth/password-hash"
import { createDb } from "@/lib/server/db/client"
import { createPool } from "@/lib/server/db/create-pool"
import { logTimes } from "../../scripts/simulate/log-times"
import { simulateAnnihilation } from "../../scripts/simulate/pair-annihilation"
import { launchBrowser } from "@tests/support/launch-browser"
import { startApp, type RunningApp } from "@tests/support/start-app"

const password = "slow decay, rough fronts"
const author = { name: "Ilse Brandvold", email: "ilse.brandvold@example.org" }

let app: RunningApp
let browser: Browser
let page: Page
let folder: string

/** 200 trajectories on 121 times: pair annihilation, whose exponent is exactly -1/2. */
function ensembleCsv(): string {
  const times = [0, ...logTimes(0.1, 1000, 30)]
  const rows = simulateAnnihilation({ sites: 2000, trajectories: 200, rate: 1, times, seed: 7 }).flatMap(
    (density, run) => times.map((t, k) => `${run + 1},${t},${density[k]}`),
  )
  return `run,t [1/J],n\n${rows.join("\n")}\n`
}

beforeAll(async () => {
  app = await startApp({ LOCAL_MODE: "true" }, { worker: true, mail: true })
  const db = createDb(createPool(app.database.appUrl, 1))
  await db
    .insertInto("person")
    .values({ ...author, passwordHash: await hashPassword(password), emailVerifiedAt: new Date() })
    .execute()
  await db.destroy()
  browser = await launchBrowser()
  const context = await browser.newContext({
    baseURL: app.url,
    viewport: { width: 1440, height: 900 },
    acceptDownloads: true,
  })
  page = await context.newPage()
  page.setDefaultTimeout(30_000)
  folder = mkdtempSync(path.join(os.tmpdir(), "afterquench-e2e-"))
  writeFileSync(path.join(folder, "ring.csv"), ensembleCsv())
})
afterAll(async () => {
  await browser?.close()
  await app?.stop()
  if (folder) rmSync(folder, { recursive: true, force: true })
})

/** axe finds nothing on the page as it stands. */
async function expectAccessible(): Promise<void> {
  const { violations } = await new AxeBuilder({ page }).analyze()
  expect(violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`)).toEqual([])
}

describe("from a raw ensemble to a bundle that verifies", () => {
  test("sign in and start a manuscript", async () => {
    await page.goto("/")
    await page.getByLabel("E-mail").fill(author.email)
    await page.getByLabel("Password").fill(password)
    await page.getByRole("button", { name: "Sign in", exact: true }).click()
    await page.waitForURL(`${app.url}/`)
    await page.getByLabel("Title").fill("Decay on a ring")
    await page.getByRole("button", { name: "Start this manuscript" }).click()
    await page.waitForURL(/\/manuscripts\//)
    await page.getByRole("heading", { name: "Decay on a ring" }).waitFor()
    await expectAccessible()
  })

  test("upload the table, see how it was read, accept it", async () => {
    await page.getByRole("link", { name: "Upload a table" }).first().click()
    await page.getByLabel("Table to upload").waitFor({ state: "attached" })
    await page.waitForLoadState("networkidle")
    await page.getByLabel("Table to upload").setInputFiles(path.join(folder, "ring.csv"))
    await page.waitForURL(/\/datasets\/ring\/1$/)
    const accept = page.getByRole("button", { name: "Accept version 1" })
    await accept.waitFor()
    expect(await page.getByLabel("Role of column 1").inputValue()).toBe("trajectory")
    expect(await page.getByLabel("Role of column 2").inputValue()).toBe("time")
    expect(await page.getByLabel("Unit of column 2").inputValue()).toBe("1/J")
    await expectAccessible()
    await accept.click()
    await page.getByText("accepted", { exact: true }).waitFor()
  })

  test("build the figure: the sentence is proposed, the window follows the keyboard, numbers follow the window", async () => {
    await page.getByRole("link", { name: "Build a figure" }).click()
    await page.getByLabel("Title").fill("Density decay")
    await page.getByRole("button", { name: "Add the figure" }).click()
    await page.getByLabel("Dataset").waitFor()
    await page.getByLabel("Kind of figure").selectOption("decay-exponent")
    await page.getByRole("button", { name: "Propose the figure" }).click()
    const handle = page.getByRole("slider", { name: "Start of the fit window" })
    await handle.waitFor()
    const value = page
      .getByRole("row", { name: /exponent/ })
      .getByRole("button")
      .first()
    const before = await value.textContent()
    const position = await handle.getAttribute("aria-valuenow")
    await handle.focus()
    for (let step = 0; step < 4; step += 1) await page.keyboard.press("ArrowLeft")
    await page.waitForFunction(
      ({ old }) => document.querySelector('[role="slider"]')?.getAttribute("aria-valuenow") !== old,
      { old: position },
    )
    await page.waitForFunction(
      ({ old }) => ![...document.querySelectorAll("td button")].some((button) => button.textContent === old),
      { old: before },
    )
    await page.getByText("unsaved work").waitFor()
    await expectAccessible()
  })

  test("unsaved work survives a reload; a slot edits the same document", async () => {
    await page.reload()
    await page
      .getByText("Save version 1")
      .waitFor()
      .catch(async () => {
        // Before the first version the proposal is made again; the kept work is taken up then.
        await page.getByRole("button", { name: "Propose the figure" }).click()
      })
    await page.getByText("Save version 1").waitFor()
    await page.getByRole("slider", { name: "Start of the fit window" }).waitFor()
    const slot = page.locator('[data-slot="/fit/band/kind"]')
    await slot.click()
    await page.getByRole("radio", { name: /simultaneous band/ }).check()
    await page.keyboard.press("Escape")
    expect(await slot.textContent()).toMatch(/simultaneous/)
  })

  test("the spec as JSON names a quantity; saving makes a version whose proof appears by itself", async () => {
    await page.getByText("The spec as JSON").click()
    const sheet = page.getByLabel("Figure spec as JSON")
    const spec = JSON.parse(await sheet.inputValue()) as { panels: { quantities: object[] }[] }
    spec.panels[0]!.quantities = [
      { name: "alphaRing", of: "exponent", theory: { value: -0.5, label: "diffusive" } },
    ]
    await sheet.fill(JSON.stringify(spec, null, 2))
    await page
      .getByRole("row", { name: /alphaRing/ })
      .first()
      .waitFor()
    await page.getByLabel("What changed").fill("First version")
    await page.getByRole("button", { name: "Save version 1" }).click()
    await page.waitForURL(/\/versions\/1$/)
    const plate = page.locator('figure img[src*="artwork/svg"]')
    await plate.waitFor({ timeout: 60_000 })
    // 86 mm at 160 per cent and 96 CSS pixels an inch.
    const box = await plate.boundingBox()
    expect(box!.width).toBeCloseTo(((86 * 1.6) / 25.4) * 96, 0)
    expect(await plate.evaluate((image: HTMLImageElement) => image.naturalWidth)).toBeGreaterThan(0)
    await expectAccessible()
  })

  test("the exponent agrees with the exact -1/2 within its own interval", async () => {
    // Torney & McConnell, J. Phys. Chem. 87, 1941 (1983): n ~ t^(-1/2) for A + A -> 0 in one dimension.
    const row = page.getByRole("row", { name: /alphaRing/ }).first()
    const interval = (await row.textContent())!.replaceAll("−", "-")
    const [, low, high] = /\[(-?[\d.]+), (-?[\d.]+)\]/.exec(interval)!
    expect(Number(low)).toBeLessThan(-0.5)
    expect(Number(high)).toBeGreaterThan(-0.5)
  })

  test("comment, resolve, reopen", async () => {
    await page.getByLabel("A new thread").fill("Is the band simultaneous?")
    await page.getByLabel("Must be settled before the lock").check()
    await page.getByRole("button", { name: "Start thread" }).click()
    await page.getByText("open, settle before the lock").waitFor()
    await page.getByRole("button", { name: "Resolve" }).click()
    await page.getByText(/resolved by Ilse/).waitFor()
    await page.getByRole("button", { name: "Reopen" }).click()
    await page.getByRole("button", { name: "Resolve" }).click()
    await page.getByText(/resolved by Ilse/).waitFor()
  })

  test("pin, sign off, lock", async () => {
    await page.getByRole("link", { name: "Decay on a ring" }).click()
    await page.getByRole("link", { name: "Draft 1" }).click()
    await page.getByRole("button", { name: "Pin version 1" }).click()
    await page.getByRole("button", { name: "Sign off Draft 1" }).click()
    await page.getByText("You have signed off on exactly what is pinned above").waitFor()
    await expectAccessible()
    await page.getByRole("button", { name: "Lock Draft 1", exact: true }).click()
    await page.getByLabel("Type “Draft 1” to confirm").fill("Draft 1")
    await page.getByRole("button", { name: "Lock Draft 1 for good" }).click()
    await page
      .getByText(/^locked/)
      .first()
      .waitFor()
  })

  test("the bundle downloads, its checksums hold, its numbers are recomputed and its figures redrawn", async () => {
    const link = page.getByRole("link", { name: "Download the bundle" })
    await link.waitFor({ timeout: 60_000 })
    const [download] = await Promise.all([page.waitForEvent("download"), link.click()])
    const file = path.join(folder, "bundle.zip")
    await download.saveAs(file)
    const { stdout } = await promisify(execFile)(
      process.execPath,
      ["scripts/run-ts.mjs", "scripts/verify.ts", file],
      {
        maxBuffer: 1 << 24,
      },
    )
    const report = JSON.parse(stdout) as {
      ok: boolean
      notCompared: number
      items: { item: string; outcome: string; detail: string }[]
    }
    expect(report.items.filter(({ outcome }) => outcome !== "holds")).toEqual([])
    expect(report).toMatchObject({ ok: true, notCompared: 0 })
    for (const file of ["results.json", ".svg"])
      expect(
        report.items.some(({ item, detail }) => item.endsWith(file) && !detail.includes("checksum")),
        file,
      ).toBe(true)

    // One flipped bit is found.
    const bytes = readFileSync(file)
    bytes[Math.floor(bytes.length / 2)]! ^= 1
    writeFileSync(file, bytes)
    await expect(
      promisify(execFile)(process.execPath, ["scripts/run-ts.mjs", "scripts/verify.ts", file], {
        maxBuffer: 1 << 24,
      }),
    ).rejects.toMatchObject({ code: 1 })
  })
})
