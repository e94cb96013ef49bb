import type { DatasetColumn } from "@/lib/contracts/datasets"
import type { ShownReading } from "./shown-reading"

/** A letter a role, so that colour is not the only carrier. */
export const roleLetters: Record<string, string> = {
  trajectory: "R",
  time: "T",
  observable: "Y",
  uncertainty: "E",
  parameter: "P",
  coordinate: "X",
  weight: "W",
}

/** First and last rows as the file has them, under the columns as they were read. */
export function FilePreview({
  reading,
  columns,
}: {
  reading: ShownReading
  columns: readonly DatasetColumn[]
}) {
  const { first, last } = reading.preview
  const rows = (list: typeof first) =>
    list.map((row, index) => (
      <tr key={index} className="border-b border-hairline">
        <th scope="row" className="pr-4 text-right font-normal text-soft tabular-nums">
          {row.line ?? ""}
        </th>
        {row.cells.slice(0, 12).map((cell, column) => (
          <td key={column} className="max-w-40 truncate px-2 py-0.5 text-right font-mono">
            {cell}
          </td>
        ))}
      </tr>
    ))
  return (
    // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex -- a scrolling region must be reachable by keyboard
    <div className="overflow-x-auto" role="region" aria-label="The file's first and last rows" tabIndex={0}>
      <table className="border-collapse text-small">
        <caption className="visually-hidden">First and last rows of the file</caption>
        <thead>
          <tr className="border-b border-rule align-bottom">
            <th scope="col" className="pr-4 text-right font-normal text-soft">
              line
            </th>
            {columns.slice(0, 12).map((column) => (
              <th key={column.index} scope="col" className="px-2 pb-1 text-right font-normal">
                <span className="block text-soft">{column.role ? roleLetters[column.role] : "–"}</span>
                <span className="font-semibold">{column.name}</span>
                {column.unit && <span className="text-soft"> [{column.unit}]</span>}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows(first)}
          {last.length > 0 && (
            <tr>
              <td colSpan={columns.length + 1} className="py-1 text-center text-soft">
                …
              </td>
            </tr>
          )}
          {rows(last)}
        </tbody>
      </table>
      {columns.length > 12 && (
        <p className="text-small text-soft">The first 12 of {columns.length} columns are shown.</p>
      )}
    </div>
  )
}
