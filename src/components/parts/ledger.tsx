export interface LedgerColumn<Row> {
  readonly key: string
  readonly heading: React.ReactNode
  readonly cell: (row: Row) => React.ReactNode
  /** Numbers stand right so that their decimal points meet. */
  readonly numeric?: boolean
  /** Left out on narrow screens. */
  readonly wideOnly?: boolean
}

/** The one table: hairlines, numbers right-aligned, the first column heads its row. */
export function Ledger<Row>({
  caption,
  columns,
  rows,
  rowKey,
  empty,
}: {
  /** Read by screen readers; shown only where the page does not already say it. */
  caption: string
  columns: readonly LedgerColumn<Row>[]
  rows: readonly Row[]
  rowKey: (row: Row) => string
  empty?: React.ReactNode
}) {
  if (rows.length === 0 && empty) return <>{empty}</>
  return (
    // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex -- a scrolling region must be reachable by keyboard
    <div className="overflow-x-auto" role="region" aria-label={caption} tabIndex={0}>
      <table className="w-full border-collapse text-small">
        <caption className="visually-hidden">{caption}</caption>
        <thead>
          <tr className="border-b border-rule">
            {columns.map((column) => (
              <th
                key={column.key}
                scope="col"
                className={`py-1.5 pr-4 font-semibold text-soft last:pr-0 ${column.numeric ? "text-right" : "text-left"} ${column.wideOnly ? "max-sm:hidden" : ""}`}
              >
                {column.heading}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={rowKey(row)} className="group border-b border-hairline align-baseline">
              {columns.map((column, index) => {
                const className = `py-1.5 pr-4 last:pr-0 ${column.numeric ? "text-right" : "text-left"} ${column.wideOnly ? "max-sm:hidden" : ""}`
                return index === 0 ? (
                  <th key={column.key} scope="row" className={`${className} font-normal`}>
                    {column.cell(row)}
                  </th>
                ) : (
                  <td key={column.key} className={className}>
                    {column.cell(row)}
                  </td>
                )
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}
