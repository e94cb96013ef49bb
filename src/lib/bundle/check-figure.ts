import { readFile } from "node:fs/promises"
import { figureSpec } from "@specs/figure-spec"
import type { DataTable } from "@specs/figure-kind"
import { artworkPath, figureFolder } from "./bundle-paths"
import type { AddItem } from "./check-bag"
import { deriveFigure } from "./derive-figure"
import type { FigureBytes, RecordedFigure } from "./draft-record"
import { firstDifference, versionTolerance } from "./numbers-agree"

/** Bytes of a payload file. @throws Error when the bag has none of that path */
export type ReadPayload = (path: string) => Promise<Uint8Array>

const parse = (bytes: Uint8Array): unknown => JSON.parse(new TextDecoder().decode(bytes))

/** The bytes of a figure as the bag has them. */
export async function keptFigure(
  figure: RecordedFigure,
  at: number,
  read: ReadPayload,
): Promise<FigureBytes> {
  const folder = figureFolder(figure, at)
  return {
    spec: await read(`${folder}/spec.json`),
    results: await read(`${folder}/results.json`),
    series: await read(`${folder}/series.json`),
    artwork: await Promise.all(figure.artwork.map(({ format }) => read(artworkPath(figure, at, format)))),
  }
}

/** Makes a figure again from its spec and the original files, in the shape in which a bundle keeps it. */
async function madeAgain(
  figure: RecordedFigure,
  spec: Uint8Array,
  tableOf: (dataset: string, number: number) => Promise<DataTable>,
): Promise<FigureBytes> {
  const tables = new Map<string, DataTable>()
  for (const { dataset, number } of figure.inputs) tables.set(dataset, await tableOf(dataset, number))
  const { results, series, artwork } = await deriveFigure(figureSpec.parse(parse(spec)), tables)
  return {
    spec,
    results,
    series,
    artwork: figure.artwork.map(({ format, dpi }) => {
      const drawn = artwork.find((one) => one.format === format && one.dpi === dpi)
      if (!drawn) throw new Error(`${format} at ${dpi ?? "no"} dpi is not drawn by this version`)
      return drawn.bytes
    }),
  }
}

/**
 * Reads the data of a figure again, computes and draws it again and compares. A figure that another version of the
 * product or of its packages made is compared number by number, within a tolerance, where its bytes differ.
 */
export async function checkFigure(
  figure: RecordedFigure,
  at: number,
  kept: FigureBytes,
  isOwnVersion: boolean,
  tableOf: (dataset: string, number: number) => Promise<DataTable>,
  add: AddItem,
): Promise<void> {
  const folder = figureFolder(figure, at)
  let made: FigureBytes
  try {
    made = await madeAgain(figure, kept.spec, tableOf)
  } catch (error) {
    add(folder, "fails", `could not be made again: ${(error as Error).message}`)
    return
  }
  const other = `made by ${figure.software.name} ${figure.software.version} with other packages`
  for (const name of ["results", "series"] as const) {
    const item = `${folder}/${name}.json`
    const what = "computed again from the original files"
    if (Buffer.compare(kept[name], made[name]) === 0) {
      add(item, "holds", `${what}, the same bytes`)
      continue
    }
    const difference = firstDifference(parse(kept[name]), parse(made[name]), isOwnVersion ? 0 : undefined)
    if (!isOwnVersion && difference === null)
      add(item, "holds", `${what}; ${other}, numbers agree within ${versionTolerance}`)
    else add(item, "fails", `${what}, and it differs at ${difference ?? "its words"}`)
  }
  for (const [index, { format }] of figure.artwork.entries()) {
    const item = artworkPath(figure, at, format)
    if (Buffer.compare(kept.artwork[index]!, made.artwork[index]!) === 0)
      add(item, "holds", "drawn again, the same bytes")
    else if (isOwnVersion) add(item, "fails", "drawn again, and it is not what the bundle holds")
    else add(item, "not-compared", `${other}, which draw it differently`)
  }
}

/** A reader of payload files on disk. */
export const payloadReader =
  (files: ReadonlyMap<string, string>): ReadPayload =>
  async (path) => {
    const file = files.get(`data/${path}`)
    if (file === undefined) throw new Error(`${path} is missing`)
    return readFile(file)
  }
