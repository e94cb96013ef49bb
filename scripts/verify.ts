import { readFile } from "node:fs/promises"
import { verifyBundle } from "../src/lib/bundle/verify-bundle"

/** `npm run --silent verify -- bundle.zip`: the report as JSON; exit code 1 when anything does not hold. */
const [file, ...rest] = process.argv.slice(2)
if (!file || rest.length > 0) {
  console.error("Usage: npm run --silent verify -- bundle.zip")
  process.exitCode = 2
} else {
  try {
    const report = await verifyBundle(await readFile(file), (item) => {
      if (!item.ok) console.error(`✗ ${item.item}: ${item.detail}`)
    })
    process.stdout.write(`${JSON.stringify(report, null, 2)}\n`)
    process.exitCode = report.ok ? 0 : 1
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== "ENOENT") throw error
    console.error(`There is no file ${file}.`)
    process.exitCode = 2
  }
}
