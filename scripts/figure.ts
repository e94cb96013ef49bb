/** Computes and draws one figure without server and database; docs/figure-spec.md explains the spec. */
import { mkdir, readFile, writeFile } from "node:fs/promises"
import path from "node:path"
import { parseArgs } from "node:util"
import { Problem, problemDocument } from "@/lib/contracts/problems"
import { computeFigure, datasetsOf } from "@specs/compute-figure"
import type { DataTable } from "@specs/figure-kind"
import type { FigureSpec } from "@specs/figure-spec"
import { readSpec } from "@specs/read-spec"
import { resultsDocument } from "@specs/results-document"
import { SpecError } from "@specs/spec-error"
import { type DataFile, readData } from "./figure/read-data"

const usage =
  "Usage: npm run --silent figure -- --spec figure.json --data NAME=path [--data NAME=path ...] --out DIR\n" +
  "       [--recipe NAME=recipe.json ...] [--accept-missing] [--dpi 300]"

const tell = (line: string) => console.error(line)

interface Wish {
  readonly spec: string
  readonly out: string
  readonly data: readonly DataFile[]
  readonly acceptMissing: boolean
  readonly dpi: number
}

const wrongUse = (message: string) => new Problem("invalid-request", `${message}\n${usage}`)

function pairs(option: string, texts: readonly string[]): Map<string, string> {
  const entries = texts.map((text) => {
    const [, name, value] = /^([^=]+)=(.+)$/s.exec(text) ?? []
    if (name === undefined || value === undefined)
      throw wrongUse(`--${option} takes NAME=path, not “${text}”.`)
    return [name, value] as const
  })
  const named = new Map(entries)
  if (named.size < entries.length) throw wrongUse(`--${option} names a dataset twice.`)
  return named
}

function wishOf(args: readonly string[]): Wish {
  try {
    const { values } = parseArgs({
      args: [...args],
      options: {
        spec: { type: "string" },
        data: { type: "string", multiple: true, default: [] },
        recipe: { type: "string", multiple: true, default: [] },
        out: { type: "string" },
        dpi: { type: "string", default: "300" },
        "accept-missing": { type: "boolean", default: false },
      },
    })
    const { spec, out } = values
    if (spec === undefined || out === undefined) throw wrongUse("--spec and --out are needed.")
    const dpi = Number(values.dpi)
    if (!(dpi >= 50 && dpi <= 1200)) throw wrongUse("--dpi is a number from 50 to 1200.")
    const recipes = pairs("recipe", values.recipe)
    const data = [...pairs("data", values.data)].map(([name, file]) => ({
      name,
      path: file,
      recipe: recipes.get(name) ?? null,
    }))
    return { spec, out, data, acceptMissing: values["accept-missing"], dpi }
  } catch (error) {
    if (error instanceof Problem) throw error
    throw wrongUse((error as Error).message)
  }
}

async function loadSpec(file: string): Promise<FigureSpec> {
  const text = await readFile(file, "utf8").catch((error: Error) => {
    throw new Problem("not-found", `The figure spec cannot be opened: ${error.message}`)
  })
  const read = readSpec(text)
  if ("spec" in read) return read.spec
  throw new Problem("invalid-figure-spec", `${file} is not a figure spec.`, read.issues)
}

async function makeFigure({ spec: specFile, out, data, acceptMissing, dpi }: Wish) {
  const spec = await loadSpec(specFile)
  const needed = new Set(datasetsOf(spec))
  const tables = new Map<string, DataTable>()
  for (const file of data)
    if (needed.has(file.name)) tables.set(file.name, await readData(file, acceptMissing, tell))
    else tell(`The figure does not use ${file.name}.`)
  const results = computeFigure(spec, { tables })
  // Loaded late: a figure that cannot be computed is told without waiting for what draws.
  const { renderFigure, svgToPdf, svgToPng } = await import("@/lib/render")
  const { svg } = await renderFigure(spec, results.panels)
  const document = `${JSON.stringify(resultsDocument(results), null, 2)}\n`
  // All is made before anything is written, so that a figure that fails leaves nothing behind.
  const files = {
    "results.json": document,
    "figure.svg": svg,
    "figure.png": await svgToPng(svg, { dpi }),
    "figure.pdf": await svgToPdf(svg, { title: spec.title }),
  }
  await mkdir(out, { recursive: true })
  for (const [name, content] of Object.entries(files)) await writeFile(path.join(out, name), content)
  return document
}

/** Anything that stops the figure as a problem; what nobody foresaw is told with its trace on standard error. */
function problemOf(error: unknown): Problem {
  if (error instanceof Problem) return error
  if (error instanceof SpecError)
    return new Problem("invalid-figure-spec", "The figure cannot be made as written.", error.issues)
  console.error(error)
  return new Problem("internal", error instanceof Error ? error.message : String(error))
}

try {
  process.stdout.write(await makeFigure(wishOf(process.argv.slice(2))))
} catch (error) {
  process.stdout.write(`${JSON.stringify(problemDocument(problemOf(error)), null, 2)}\n`)
  process.exitCode = 1
}
