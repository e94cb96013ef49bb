export type CsvCell = number | string | null | undefined

const quoted = (text: string) => (/[",\n\r]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text)

/**
 * One line of CSV with its line end. Numbers in their shortest exact form; nothing for what is missing.
 *
 * @see RFC 4180
 */
export const csvLine = (cells: readonly CsvCell[]): string =>
  `${cells.map((cell) => (cell == null ? "" : quoted(String(cell)))).join(",")}\r\n`

/** A text that people wrote, as a cell that a spreadsheet does not take for a formula. */
export const csvText = (text: string): string => (/^[=+\-@\t\r]/.test(text) ? `'${text}` : text)
