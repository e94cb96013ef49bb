import { collectColumns, fileSource, parseRecipe, readTable } from "@/lib/tables"
import type { DataTable } from "@specs/figure-kind"
import type { RecordedDataset } from "./draft-record"

/**
 * Reads an uploaded file again as it was read when it was accepted: values from the file, names, units and symbols as a
 * person corrected them.
 *
 * @param file where the bytes lie
 * @throws Error with the reader's sentence when it is refused
 */
export async function readOriginal(dataset: RecordedDataset, file: string): Promise<DataTable> {
  const source = await fileSource(file, dataset.fileName)
  try {
    const collected = collectColumns()
    const reading = await readTable(source, { recipe: parseRecipe(dataset.recipe) }, collected.sink)
    if (reading.refused) throw new Error(`${dataset.fileName}: ${reading.refused.message}`)
    const columns = collected.columns().map((column, index) => {
      const { name, unit, symbol } = dataset.columns.find((accepted) => accepted.index === index) ?? column
      return { name, unit, symbol, values: column.values }
    })
    return { rows: reading.rows, columns }
  } finally {
    await source.close()
  }
}
