import { Ledger } from "@/components/parts/ledger"
import { MathText } from "@/components/parts/math-text"
import type { DatasetColumn } from "@/lib/contracts/datasets"
import { columnRole } from "@specs/schema/data-binding"
import { roleLetters } from "./file-preview"

export interface ColumnChange {
  readonly index: number
  readonly name?: string
  readonly unit?: string | null
  readonly symbol?: string | null
  readonly role?: DatasetColumn["role"]
}

interface Statistics {
  readonly count?: number
  readonly min?: number | null
  readonly max?: number | null
  readonly missingCount?: number
  readonly nanCount?: number
  readonly roleReason?: string | null
  readonly sketch?: { readonly counts: readonly number[] } | null
}

const short = (value: number | null | undefined) =>
  value === null || value === undefined ? "" : String(Number(value.toPrecision(4))).replace("-", "−")

/** Bars of equal width: how the values of a column lie between its ends. */
function Sketch({ counts }: { counts: readonly number[] }) {
  const highest = Math.max(...counts, 1)
  return (
    <svg
      aria-hidden="true"
      viewBox={`0 0 ${counts.length} 10`}
      preserveAspectRatio="none"
      className="h-4 w-20 text-settled"
    >
      {counts.map((count, index) => {
        const height = (10 * count) / highest
        return <rect key={index} x={index} y={10 - height} width="0.85" height={height} fill="currentColor" />
      })}
    </svg>
  )
}

/** The columns as proposed; names, units, symbols and roles are corrected in place until the version is accepted. */
export function ColumnsLedger({
  columns,
  isOpen,
  onChange,
}: {
  columns: readonly DatasetColumn[]
  isOpen: boolean
  onChange: (change: ColumnChange) => void
}) {
  const text = (column: DatasetColumn, key: "name" | "unit" | "symbol", label: string) =>
    isOpen ? (
      <input
        aria-label={`${label} of column ${column.index + 1}`}
        defaultValue={column[key] ?? ""}
        onBlur={(event) => {
          const value = event.target.value.trim()
          if (value === (column[key] ?? "")) return
          if (key === "name") {
            if (value !== "") onChange({ index: column.index, name: value })
          } else onChange({ index: column.index, [key]: value === "" ? null : value })
        }}
        className="min-h-6 w-full max-w-32 min-w-12 border-b border-rule bg-transparent"
      />
    ) : key === "symbol" && column.symbol ? (
      <MathText text={`$${column.symbol}$`} />
    ) : (
      (column[key] ?? "")
    )
  return (
    <Ledger
      caption="Columns"
      rows={columns}
      rowKey={(column) => String(column.index)}
      columns={[
        { key: "name", heading: "Name", cell: (column) => text(column, "name", "Name") },
        { key: "unit", heading: "Unit", cell: (column) => text(column, "unit", "Unit") },
        {
          key: "symbol",
          heading: "Symbol",
          wideOnly: true,
          cell: (column) => text(column, "symbol", "Symbol, in TeX,"),
        },
        {
          key: "role",
          heading: "Role",
          cell: (column) => {
            const { roleReason } = (column.statistics ?? {}) as Statistics
            return isOpen ? (
              <select
                aria-label={`Role of column ${column.index + 1}`}
                title={roleReason ?? undefined}
                value={column.role ?? ""}
                onChange={(event) =>
                  onChange({
                    index: column.index,
                    role: (event.target.value || null) as DatasetColumn["role"],
                  })
                }
                className="min-h-6 rounded-sheet border border-rule bg-raised"
              >
                <option value="">none</option>
                {columnRole.options.map((role) => (
                  <option key={role} value={role}>
                    {roleLetters[role]} {role}
                  </option>
                ))}
              </select>
            ) : (
              (column.role ?? "")
            )
          },
        },
        {
          key: "range",
          heading: "Range",
          numeric: true,
          cell: (column) => {
            const { min, max } = (column.statistics ?? {}) as Statistics
            return min === null || min === undefined ? column.kind : `${short(min)} … ${short(max)}`
          },
        },
        {
          key: "missing",
          heading: "Missing",
          numeric: true,
          wideOnly: true,
          cell: (column) => {
            const { missingCount = 0, nanCount = 0 } = (column.statistics ?? {}) as Statistics
            return missingCount + nanCount
          },
        },
        {
          key: "sketch",
          heading: "Values",
          wideOnly: true,
          cell: (column) => {
            const { sketch } = (column.statistics ?? {}) as Statistics
            return sketch ? <Sketch counts={sketch.counts} /> : ""
          },
        },
      ]}
    />
  )
}
