import { access } from "node:fs/promises"
import { verifyBundle } from "@/lib/bundle/verify-bundle"

/** `npm run --silent verify -- bundle.zip`: the report as JSON; exit code 1 when anything does not hold. */
const [file, ...rest] = process.argv.slice(2)
if (!file || rest.length > 0) {
  console.error("Usage: npm run --silent verify -- bundle.zip")
  process.exitCode = 2
} else {
  try {
    await access(file)
    const report = await verifyBundle(file, ({ item, ok, detail }) => {
      if (!ok) console.error(`✗ ${item}: ${detail}`)
    })
    process.stdout.write(`${JSON.stringify(report, null, 2)}\n`)
    process.exitCode = report.ok ? 0 : 1
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== "ENOENT") throw error
    console.error(`There is no file ${file}.`)
    process.exitCode = 2
  }
}
