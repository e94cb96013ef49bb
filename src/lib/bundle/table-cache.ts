import type { DataTable } from "@specs/figure-kind"
import { originalPath } from "./bundle-paths"
import type { DraftRecord } from "./draft-record"
import { readOriginal } from "./read-original"
import type { UnpackedBag } from "./unpack-bag"

const key = (dataset: string, number: number) => `${dataset} ${number}`

/** The tables of a bundle, each read once and kept until the last figure that plots it is done. */
export function tableCache(record: DraftRecord, bag: UnpackedBag) {
  const tables = new Map<string, Promise<DataTable>>()
  const lastUse = new Map<string, number>()
  for (const [at, figure] of record.figures.entries())
    for (const { dataset, number } of figure.inputs) lastUse.set(key(dataset, number), at)
  const read = async (name: string, number: number) => {
    const dataset = record.datasets.find((one) => one.name === name && one.number === number)
    const file = dataset && bag.files.get(`data/${originalPath(dataset)}`)
    if (!dataset || !file) throw new Error(`version ${number} of ${name} is not in the bundle`)
    return readOriginal(dataset, file)
  }
  return {
    tableOf: (name: string, number: number): Promise<DataTable> => {
      const known = tables.get(key(name, number)) ?? read(name, number)
      tables.set(key(name, number), known)
      return known
    },
    forgetAfter: (figureAt: number) => {
      for (const [name, at] of lastUse) if (at <= figureAt) tables.delete(name)
    },
  }
}
