import { createHash } from "node:crypto"
import { mkdtemp, rm, writeFile } from "node:fs/promises"
import os from "node:os"
import path from "node:path"
import { strToU8, unzipSync, zipSync } from "fflate"
import { afterAll, beforeAll, describe, expect, test } from "vitest"
import { verifyBundle } from "@/lib/bundle/verify-bundle"
import { writeBundle } from "@/lib/bundle/write-bag"
import { bundleContent } from "@/lib/server/services/drafts/bundle-content"
import { softwareVersion } from "@/lib/bundle/software-version"
import { decayCsv, decaySpec } from "@tests/support/decay-table"
import { until } from "@tests/support/until"
import { acceptedDataset, computedFigure, startGroup, type WorkingGroup } from "@tests/support/working-group"

let group: WorkingGroup
let folder: string
let zip: Uint8Array
const folderInZip = "slow-decay-draft-1"

beforeAll(async () => {
  group = await startGroup()
  folder = await mkdtemp(path.join(os.tmpdir(), "afterquench-bundle-"))
  const author = group.people["corresponding-author"]
  await acceptedDataset(author)
  await acceptedDataset(author, "more", decayCsv({ seed: 2 }))
  const figures = [
    await computedFigure(author),
    await computedFigure(author, "again", decaySpec({ dataset: "more", quantity: "alphaAgain" })),
  ]
  const draft = await author.act("GET", "/drafts/1")
  const pins = { figures: figures.map((figureId) => ({ figureId, version: 1 })) }
  const pinned = await author.act("PUT", "/drafts/1/figures", pins, {
    "if-match": `"${String(draft.revision)}"`,
  })
  for (const person of [author, group.people["co-author"]])
    await person.act("POST", "/drafts/1/sign-offs", { digest: pinned.digest })
  await author.act("POST", "/drafts/1/lock", { confirm: "Draft 1", digest: pinned.digest })
  await until("the bundle", async () => {
    const { bundle } = await author.act("GET", "/drafts/1")
    const { state, failure } = bundle as { state: string; failure: string | null }
    if (state === "failed") throw new Error(String(failure))
    return state === "done"
  })
  const address = `${group.app.url}/api/v1/manuscripts/${group.manuscriptId}/drafts/1/bundle`
  const response = await fetch(address, { headers: author.headers })
  zip = new Uint8Array(await response.arrayBuffer())
  expect(response.headers.get("etag")).toBe(`"${sha256(zip)}"`)
  expect(response.headers.get("content-disposition")).toContain(`filename="${folderInZip}.zip"`)
})
afterAll(async () => {
  await group.stop()
  await rm(folder, { recursive: true, force: true })
})

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex")
const text = (files: Record<string, Uint8Array>, name: string) =>
  new TextDecoder().decode(files[`${folderInZip}/${name}`])

async function verify(bytes: Uint8Array) {
  const file = path.join(folder, "bundle.zip")
  await writeFile(file, bytes)
  const report = await verifyBundle(file)
  return { ...report, failures: report.items.filter((item) => !item.ok) }
}

test("verifies from its own bytes", async () => {
  const report = await verify(zip)
  expect(report.failures).toEqual([])
  expect(report).toMatchObject({ ok: true, notCompared: 0 })
  const holding = new Map(report.items.map(({ item, detail }) => [item, detail]))
  expect(holding.get("digest")).toMatch(/exactly these/)
  expect(holding.get("archive")).toMatch(/same bytes/)
  expect(holding.get("figures/02-again/results.json")).toMatch(/computed again/)
  for (const format of ["svg", "png", "pdf", "eps", "tiff"])
    expect(holding.get(`figures/01-decay/figure-1.${format}`)).toMatch(/drawn again/)
})

test("is the same bytes when it is made again", async () => {
  const { id } = await group.db.selectFrom("draft").select("id").executeTakeFirstOrThrow()
  for (let time = 0; time < 2; time += 1) {
    const pieces: Uint8Array[] = []
    for await (const piece of writeBundle(await bundleContent(group.db, id))) pieces.push(piece)
    expect(sha256(Buffer.concat(pieces))).toBe(sha256(zip))
  }
})

describe("holds", () => {
  test("a bag whose checksums are right (RFC 8493)", () => {
    const files = unzipSync(zip)
    expect(text(files, "bagit.txt")).toBe("BagIt-Version: 1.0\nTag-File-Character-Encoding: UTF-8\n")
    const payload = Object.keys(files).filter((name) => name.startsWith(`${folderInZip}/data/`))
    const lines = text(files, "manifest-sha256.txt").trimEnd().split("\n")
    expect(lines.map((line) => `${folderInZip}/${line.slice(66)}`).sort()).toEqual(payload.sort())
    for (const line of lines)
      expect(sha256(files[`${folderInZip}/${line.slice(66)}`]!)).toBe(line.slice(0, 64))
    const octets = payload.reduce((sum, name) => sum + files[name]!.length, 0)
    expect(text(files, "bag-info.txt")).toContain(`Payload-Oxum: ${octets}.${payload.length}\n`)
  })

  test("the file as it was uploaded, the numbers as macros, the captions", () => {
    const files = unzipSync(zip)
    expect(text(files, "data/datasets/runs/version-1/original/runs")).toBe(decayCsv())
    expect(text(files, "data/tex/values.tex")).toMatch(
      /\\newcommand{\\alphaTest}{\\ensuremath{-0\.\d+\(\d+\)}}/,
    )
    expect(text(files, "data/tex/values-siunitx.tex")).toMatch(
      /\\newcommand{\\alphaAgain}{\\num{-0\.\d+\(\d+\)}}/,
    )
    expect(text(files, "data/tex/captions.tex")).toContain("\\newcommand{\\captionOfB}{Decay of $n(t)$.%\n}")
    const csv = text(files, "data/figures/01-decay/data/panel-1-mean.csv").split("\r\n")
    const schema = JSON.parse(text(files, "data/figures/01-decay/data/panel-1-mean.schema.json")) as {
      fields: { name: string }[]
    }
    expect(csv[0]).toBe(schema.fields.map((field) => field.name).join(","))
  })

  test("metadata with what RO-Crate 1.2 requires of the root", () => {
    const crate = JSON.parse(text(unzipSync(zip), "data/ro-crate-metadata.json")) as {
      "@context": string
      "@graph": Record<string, unknown>[]
    }
    expect(crate["@context"]).toBe("https://w3id.org/ro/crate/1.2/context")
    const byId = new Map(crate["@graph"].map((entity) => [entity["@id"], entity]))
    expect(byId.size).toBe(crate["@graph"].length)
    expect(byId.get("ro-crate-metadata.json")).toMatchObject({
      conformsTo: { "@id": "https://w3id.org/ro/crate/1.2" },
      about: { "@id": "./" },
    })
    const root = byId.get("./")!
    for (const property of ["name", "description", "datePublished", "license"])
      expect(root[property]).toBeTruthy()
    const files = unzipSync(zip)
    for (const { "@id": id } of root.hasPart as { "@id": string }[]) {
      expect(byId.get(id)).toMatchObject({ "@type": "File" })
      expect(files).toHaveProperty([`${folderInZip}/data/${decodeURI(id)}`])
    }
  })
})

/** The bundle with changed files; its checksums are made right again when `forged`. */
function changed(change: (files: Record<string, Uint8Array>) => void, forged = false): Uint8Array {
  const files = Object.fromEntries(
    Object.entries(unzipSync(zip)).map(([name, bytes]) => [name.slice(folderInZip.length + 1), bytes]),
  )
  change(files)
  if (forged) {
    const manifest = (names: string[]) =>
      strToU8(names.map((name) => `${sha256(files[name]!)}  ${name}\n`).join(""))
    const payload = Object.keys(files).filter((name) => name.startsWith("data/"))
    files["manifest-sha256.txt"] = manifest(payload.sort())
    const tags = ["bag-info.txt", "bagit.txt", "manifest-sha256.txt"]
    files["tagmanifest-sha256.txt"] = manifest(tags)
  }
  return zipSync(
    Object.fromEntries(Object.entries(files).map(([name, bytes]) => [`${folderInZip}/${name}`, bytes])),
  )
}
const edit =
  (name: string, from: string | RegExp, to: string) =>
  (files: Record<string, Uint8Array>): void => {
    const before = new TextDecoder().decode(files[name])
    const after = before.replace(from, to)
    if (after === before) throw new Error(`${name} does not hold ${from}`)
    files[name] = strToU8(after)
  }

describe("damage is refused, with its place:", () => {
  test.each<[string, (files: Record<string, Uint8Array>) => void, boolean, string]>([
    [
      "a changed number",
      edit("data/figures/01-decay/results.json", /"value":-0\.5/, '"value":-0.6'),
      false,
      "data/figures/01-decay/results.json",
    ],
    ["a missing file", (files) => delete files["data/tex/captions.tex"], false, "data/tex/captions.tex"],
    ["an added file", (files) => (files["data/extra.txt"] = strToU8("x")), false, "data/extra.txt"],
    [
      "a manifest without a line",
      edit("manifest-sha256.txt", /.*README.md\n/, ""),
      false,
      "manifest-sha256.txt",
    ],
    [
      "a changed number with forged checksums",
      edit("data/figures/01-decay/results.json", /"value":-0\.5/, '"value":-0.6'),
      true,
      "figures/01-decay/results.json",
    ],
    [
      "a changed macro with forged checksums",
      edit("data/tex/values.tex", "{-0.", "{-1."),
      true,
      "tex/values.tex",
    ],
    [
      "a changed point with forged checksums",
      edit("data/figures/02-again/data/panel-1-mean.csv", /,0\./, ",1."),
      true,
      "figures/02-again/data/panel-1-mean.csv",
    ],
    [
      "another caption with forged checksums",
      edit("data/draft.json", "Decay of $n(t)$.", "Growth of $n(t)$."),
      true,
      "digest",
    ],
    [
      "an added file with forged checksums",
      (files) => (files["data/extra.txt"] = strToU8("x")),
      true,
      "data/extra.txt",
    ],
    [
      "originals that changed places, with forged checksums",
      (files) => {
        const [one, other] = ["runs/version-1/original/runs", "more/version-1/original/more"].map(
          (name) => `data/datasets/${name}`,
        )
        ;[files[one!], files[other!]] = [files[other!]!, files[one!]!]
      },
      true,
      "datasets/runs/version-1/original/runs",
    ],
    [
      "drawings that changed places, with forged checksums",
      (files) => {
        const [one, other] = ["01-decay/figure-1.png", "02-again/figure-2.png"].map(
          (name) => `data/figures/${name}`,
        )
        ;[files[one!], files[other!]] = [files[other!]!, files[one!]!]
      },
      true,
      "figures/01-decay/figure-1.png",
    ],
    [
      "the record of something else, with forged checksums",
      edit("data/draft.json", '"formatVersion": 1', '"formatVersion": 2'),
      true,
      "data/draft.json",
    ],
  ])("%s", async (_, change, forged, place) => {
    const { ok, failures } = await verify(changed(change, forged))
    expect(ok).toBe(false)
    expect(failures.map(({ item }) => item)).toContain(place)
  })

  test("one flipped bit, wherever it is", async () => {
    // In a local header, in compressed data, in a data descriptor or the directory, in the last record.
    for (const share of [0.00001, 0.1, 0.45, 0.8, 0.99, 0.9999]) {
      const damaged = Uint8Array.from(zip)
      damaged[Math.floor(share * zip.length)]! ^= 4
      const { ok, failures } = await verify(damaged)
      expect(ok, `bit at ${share}`).toBe(false)
      expect(failures[0]?.item).toBeTruthy()
    }
  })

  test("half a file, and a file that is no archive", async () => {
    for (const bytes of [zip.subarray(0, zip.length / 2), strToU8("not a bundle")])
      expect((await verify(bytes)).failures).toMatchObject([{ item: "archive" }])
  })
})

test("what another version made is compared within its tolerance, and the report says so", async () => {
  const lockfile = new RegExp(softwareVersion().lockfileSha256, "g")
  const { failures, notCompared, items } = await verify(
    changed((files) => {
      edit("data/draft.json", lockfile, "0".repeat(64))(files)
      edit("data/figures/01-decay/figure-1.svg", "</svg>", "</svg >")(files)
    }, true),
  )
  expect(failures).toEqual([])
  expect(notCompared).toBeGreaterThan(0)
  expect(items.find(({ item }) => item === "figures/01-decay/figure-1.svg")?.outcome).toBe("not-compared")
})
