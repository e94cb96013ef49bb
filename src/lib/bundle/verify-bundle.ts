import { createHash } from "node:crypto"
import { createReadStream } from "node:fs"
import { mkdtemp, readFile, rm, writeFile } from "node:fs/promises"
import os from "node:os"
import path from "node:path"
import { canonicalJson } from "@/lib/domain/canonical-json"
import { draftContent } from "@/lib/domain/draft-digest"
import { renderingVersions } from "@/lib/render"
import { bundleFiles } from "./bundle-files"
import { originalPath } from "./bundle-paths"
import { checkArchive } from "./check-archive"
import { type AddItem, checkBag, type CheckItem } from "./check-bag"
import { checkFigure, keptFigure, payloadReader } from "./check-figure"
import { type BundleContent, bundleRecord, type RecordOfBundle } from "./draft-record"
import { softwareVersion } from "./software-version"
import { tableCache } from "./table-cache"
import { BagError, unpackBag, type UnpackedBag } from "./unpack-bag"

export interface VerificationReport {
  /** Nothing fails. What another version made, and only it can compare byte by byte, is counted apart. */
  readonly ok: boolean
  readonly checked: number
  readonly failed: number
  readonly notCompared: number
  readonly items: readonly CheckItem[]
}

/**
 * Verifies a bundle from its own bytes alone: every checksum; the digest that was signed; every number computed and every
 * figure drawn again from the original files; every other file, and the archive itself, made again and compared.
 *
 * @param bundle its path, or its bytes
 * @param onItem called with each finding as it is made
 */
export async function verifyBundle(
  bundle: string | Uint8Array,
  onItem?: (item: CheckItem) => void,
): Promise<VerificationReport> {
  const items: CheckItem[] = []
  const add: AddItem = (item, outcome, detail) => {
    const found = { item, ok: outcome !== "fails", outcome, detail }
    items.push(found)
    onItem?.(found)
  }
  const folder = await mkdtemp(path.join(os.tmpdir(), "afterquench-verify-"))
  try {
    const zip = typeof bundle === "string" ? bundle : path.join(folder, "bundle.zip")
    if (typeof bundle !== "string") await writeFile(zip, bundle)
    await verifyUnpacked(zip, await unpackBag(zip, folder), add)
  } catch (error) {
    if (!(error instanceof BagError)) throw error
    add("archive", "fails", error.message)
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
  const count = (outcome: CheckItem["outcome"]) => items.filter((item) => item.outcome === outcome).length
  const failed = count("fails")
  return { ok: failed === 0, checked: items.length, failed, notCompared: count("not-compared"), items }
}

async function verifyUnpacked(zip: string, bag: UnpackedBag, add: AddItem): Promise<void> {
  const software = softwareVersion()
  let anyFailed = false
  const note: AddItem = (item, outcome, detail) => {
    anyFailed ||= outcome === "fails"
    add(item, outcome, detail)
  }
  const checksums = await checkBag(bag, note)
  const record = await readRecord(bag, note)
  if (!record) return
  const content = await contentOf(bag, record, note)
  if (!content) return
  checkDigest(content, checksums, note)
  const cache = tableCache(record, bag)
  const own = canonicalJson({ rendering: renderingVersions(), lockfile: software.lockfileSha256 })
  for (const [at, figure] of record.figures.entries()) {
    const made = canonicalJson({ rendering: figure.rendering, lockfile: figure.software.lockfileSha256 })
    await checkFigure(figure, at, content.figures[at]!, made === own, cache.tableOf, note)
    cache.forgetAfter(at)
  }
  const isOwnBundle = record.software.lockfileSha256 === software.lockfileSha256
  await checkOtherFiles(bag, content, isOwnBundle, note)
  // Whatever fails above makes the archive differ too; that would be no news.
  if (!anyFailed) await checkArchive(zip, content, software, isOwnBundle, note)
}

async function readRecord(bag: UnpackedBag, add: AddItem): Promise<RecordOfBundle | null> {
  const item = "data/draft.json"
  const file = bag.files.get(item)
  const refuse = (detail: string) => {
    add(item, "fails", detail)
    return null
  }
  if (file === undefined) return refuse("missing: this is no bundle")
  let json: unknown
  try {
    json = JSON.parse(await readFile(file, "utf8"))
  } catch (error) {
    return refuse(`not JSON: ${(error as Error).message}`)
  }
  const parsed = bundleRecord.safeParse(json)
  if (parsed.success) return parsed.data
  const [issue] = parsed.error.issues
  return refuse(`not the record of a bundle of format 1: ${issue?.path.join("/")}: ${issue?.message}`)
}

/** What the bag says it holds, in the shape from which a bundle is made. */
async function contentOf(
  bag: UnpackedBag,
  { software, ...record }: RecordOfBundle,
  add: AddItem,
): Promise<BundleContent | null> {
  const read = payloadReader(bag.files)
  try {
    const figures = await Promise.all(record.figures.map((figure, at) => keptFigure(figure, at, read)))
    return {
      record,
      software,
      figures,
      original: (dataset) => createReadStream(bag.files.get(`data/${originalPath(dataset)}`)!),
    }
  } catch (error) {
    add("data/figures", "fails", (error as Error).message)
    return null
  }
}

const sha256 = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest("hex")

/** The digest covers title, captions, specs, numbers and data; all of them as they lie here. */
function checkDigest(
  { record, figures }: BundleContent,
  checksums: ReadonlyMap<string, string>,
  add: AddItem,
): void {
  for (const dataset of record.datasets) {
    const found = checksums.get(`data/${originalPath(dataset)}`)
    if (found !== dataset.sha256)
      add(originalPath(dataset), "fails", found ? "is not the file that was pinned" : "is missing")
  }
  const digest = sha256(
    draftContent(
      record.manuscript.title,
      record.figures.map(({ name, caption, inputs }, at) => ({
        figure: name,
        caption,
        specSha256: sha256(figures[at]!.spec),
        resultsSha256: sha256(figures[at]!.results),
        data: Object.fromEntries(inputs.map((input) => [input.dataset, input.sha256])),
      })),
    ),
  )
  if (digest === record.draft.digest) add("digest", "holds", "covers exactly these figures, numbers and data")
  else add("digest", "fails", "what was signed and locked is something else than this")
}

/** Everything in the payload that follows from the record, specs, results and series. */
async function checkOtherFiles(
  bag: UnpackedBag,
  content: BundleContent,
  isOwnBundle: boolean,
  add: AddItem,
): Promise<void> {
  let expected: ReturnType<typeof bundleFiles>
  try {
    expected = bundleFiles(content)
  } catch (error) {
    add("data", "fails", `the bundle could not be made again: ${(error as Error).message}`)
    return
  }
  const known = new Set(expected.map(({ path: name }) => `data/${name}`))
  for (const name of bag.files.keys())
    if (name.startsWith("data/") && !known.has(name)) add(name, "fails", "belongs to no figure or dataset")
  for (const file of expected) {
    if (!("bytes" in file)) continue
    const kept = bag.files.get(`data/${file.path}`)
    if (kept === undefined) add(file.path, "fails", "missing")
    else if (Buffer.compare(await readFile(kept), file.bytes) !== 0)
      add(
        file.path,
        isOwnBundle ? "fails" : "not-compared",
        isOwnBundle ? "is not what follows from the record" : "written by another version of the product",
      )
  }
}
