import { createHash } from "node:crypto"
import { canonicalJson } from "@/lib/domain/canonical-json"
import { draftContent } from "@/lib/domain/draft-digest"
import { renderFigure, svgToPdf, svgToPng } from "@/lib/render"
import { bytesSource, collectColumns, parseRecipe, readTable } from "@/lib/tables"
import { computeFigure } from "@specs/compute-figure"
import type { DataTable } from "@specs/figure-kind"
import { figureSpec } from "@specs/figure-spec"
import { resultsDocument } from "@specs/results-document"
import type { BundledDataset } from "./bundle-content"
import { checkBag, type CheckItem, unpack } from "./read-bag"

export interface VerificationReport {
  readonly ok: boolean
  readonly checked: number
  readonly failed: number
  readonly items: readonly CheckItem[]
}

interface DraftRecord {
  readonly format: string
  readonly formatVersion: number
  readonly manuscript: { readonly title: string }
  readonly draft: { readonly digest: string }
  readonly figures: readonly {
    readonly name: string
    readonly caption: string
    readonly folder: string
    readonly inputs: readonly { readonly dataset: string; readonly sha256: string; readonly folder: string }[]
    readonly artwork: readonly { readonly format: string; readonly dpi: number | null }[]
  }[]
}

const sha256 = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest("hex")
const decode = (bytes: Uint8Array) => new TextDecoder().decode(bytes)
const same = (a: Uint8Array, b: Uint8Array) => a.length === b.length && a.every((byte, at) => byte === b[at])

/**
 * Verifies a bundle from its own bytes alone: every checksum, the digest, and for every figure the original files read
 * again, the numbers computed again, the artwork drawn again, all compared byte for byte.
 *
 * @param zip the bundle
 * @param onItem called with each finding as it is made
 */
export async function verifyBundle(
  zip: Uint8Array,
  onItem?: (item: CheckItem) => void,
): Promise<VerificationReport> {
  const items: CheckItem[] = []
  const add = (item: string, ok: boolean, detail: string) => {
    items.push({ item, ok, detail })
    onItem?.({ item, ok, detail })
  }
  const files = unpack(zip)
  if (files instanceof Error) add("bundle", false, `The archive cannot be read: ${files.message}`)
  else {
    for (const { item, ok, detail } of checkBag(files)) add(item, ok, detail)
    const record = readRecord(files.get("data/draft.json"))
    if (typeof record === "string") add("data/draft.json", false, record)
    else {
      checkDigest(files, record, add)
      for (const figure of record.figures) await checkFigure(files, figure, add)
    }
  }
  const failed = items.filter((item) => !item.ok).length
  return { ok: failed === 0, checked: items.length, failed, items }
}

function readRecord(bytes: Uint8Array | undefined): DraftRecord | string {
  if (!bytes) return "missing"
  try {
    const record = JSON.parse(decode(bytes)) as DraftRecord
    if (record.format !== "afterquench-bundle") return "not the record of a bundle"
    if (record.formatVersion !== 1) return `made by a newer version (format ${record.formatVersion})`
    return record
  } catch (error) {
    return `not JSON: ${(error as Error).message}`
  }
}

type Add = (item: string, ok: boolean, detail: string) => void

function checkDigest(files: ReadonlyMap<string, Uint8Array>, record: DraftRecord, add: Add): void {
  const content = draftContent(
    record.manuscript.title,
    record.figures.map((figure) => ({
      figure: figure.name,
      caption: figure.caption,
      specSha256: sha256(files.get(`data/${figure.folder}/spec.json`) ?? ""),
      resultsSha256: sha256(files.get(`data/${figure.folder}/results.json`) ?? ""),
      data: Object.fromEntries(figure.inputs.map((input) => [input.dataset, input.sha256])),
    })),
  )
  const holds = sha256(content) === record.draft.digest
  add(
    "digest",
    holds,
    holds ? "covers exactly these figures" : "the figures are not the ones that were signed",
  )
}

async function readInput(
  files: ReadonlyMap<string, Uint8Array>,
  folder: string,
  expected: string,
): Promise<DataTable> {
  const described = files.get(`data/${folder}/reading.json`)
  if (!described) throw new Error(`${folder}/reading.json is missing`)
  const { fileName, recipe, columns } = JSON.parse(decode(described)) as Pick<
    BundledDataset,
    "fileName" | "recipe" | "columns"
  >
  const original = files.get(`data/${folder}/${fileName}`)
  if (!original) throw new Error(`${folder}/${fileName} is missing`)
  if (sha256(original) !== expected) throw new Error(`${folder}/${fileName} is not the file that was pinned`)
  const collected = collectColumns()
  const reading = await readTable(
    bytesSource(fileName, original),
    { recipe: parseRecipe(recipe) },
    collected.sink,
  )
  if (reading.refused) throw new Error(`${folder}/${fileName}: ${reading.refused.message}`)
  return {
    rows: reading.rows,
    // Names, units and symbols as they were accepted; values as they are read again.
    columns: collected.columns().map((column, index) => {
      const { name, unit, symbol } = columns.find((accepted) => accepted.index === index) ?? column
      return { name, unit, symbol, values: column.values }
    }),
  }
}

async function checkFigure(
  files: ReadonlyMap<string, Uint8Array>,
  figure: DraftRecord["figures"][number],
  add: Add,
): Promise<void> {
  const at = (name: string) => files.get(`data/${figure.folder}/${name}`)
  const compare = (name: string, made: Uint8Array, what: string) => {
    const kept = at(name)
    const holds = kept !== undefined && same(kept, made)
    add(
      `${figure.folder}/${name}`,
      holds,
      holds ? `${what}, the same bytes` : `${what}, and it is not what the bundle holds`,
    )
  }
  try {
    const spec = figureSpec.parse(JSON.parse(decode(at("spec.json") ?? new Uint8Array())))
    const tables = new Map<string, DataTable>()
    for (const input of figure.inputs)
      tables.set(input.dataset, await readInput(files, input.folder, input.sha256))
    const results = computeFigure(spec, { tables })
    const encode = (value: unknown) => new TextEncoder().encode(canonicalJson(value))
    compare("results.json", encode(resultsDocument(results)), "recomputed from the original files")
    compare(
      "series.json",
      encode(results.panels.map((panel) => panel.series)),
      "recomputed from the original files",
    )
    const { svg } = await renderFigure(spec, results.panels)
    const stem = `figure-${Number(/figures\/(\d+)-/.exec(`${figure.folder}`)?.[1] ?? 0)}`
    for (const { format, dpi } of figure.artwork) {
      if (format === "svg") compare(`${stem}.svg`, new TextEncoder().encode(svg), "drawn again")
      else if (format === "png")
        compare(`${stem}.png`, await svgToPng(svg, { dpi: dpi ?? 300 }), "drawn again")
      else if (format === "pdf")
        compare(`${stem}.pdf`, await svgToPdf(svg, { title: spec.title }), "drawn again")
      else add(`${figure.folder}/${stem}.${format}`, false, `${format} is not redrawn by this version`)
    }
  } catch (error) {
    add(figure.folder, false, `could not be recomputed: ${(error as Error).message}`)
  }
}
