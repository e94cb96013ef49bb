import { Button } from "@/components/parts/button"
import { Field, Select } from "@/components/parts/field"
import type { RowFilter } from "@specs/schema/data-binding"
import type { SlotSurroundings } from "./slot-control"

const shown = (filter: RowFilter) =>
  filter.equals !== undefined
    ? String(filter.equals)
    : filter.oneOf
      ? filter.oneOf.join(", ")
      : (filter.range ?? []).map((end) => end ?? "").join(" … ")

/** "where γ = 0.1": one line a condition. Several values are separated by commas; a range is written 1 … 5. */
export function FiltersControl({
  value,
  surroundings,
  onChange,
}: {
  value: unknown
  surroundings: SlotSurroundings
  onChange: (value: unknown) => void
}) {
  const filters = Array.isArray(value) ? (value as RowFilter[]) : []
  const replace = (index: number, filter: RowFilter | null) =>
    onChange(filters.flatMap((old, i) => (i === index ? (filter ? [filter] : []) : [old])))
  const column = (name: string) => surroundings.columns.find((c) => c.name === name)
  const first = surroundings.columns.find((c) => c.role === "parameter") ?? surroundings.columns[0]
  return (
    <div className="grid gap-3">
      {filters.map((filter, index) => (
        <div key={index} className="grid grid-cols-[1fr_1fr] items-end gap-2">
          <Select
            label="Column"
            value={filter.column}
            onChange={(event) =>
              replace(index, {
                column: event.target.value,
                equals: column(event.target.value)?.values[0] ?? 0,
              })
            }
            options={surroundings.columns.map(({ name }) => ({ value: name, label: name }))}
          />
          <Field
            label="is"
            defaultValue={shown(filter)}
            list={`values-${index}`}
            onBlur={(event) => {
              const condition = parseCondition(event.target.value)
              if (condition) replace(index, { column: filter.column, ...condition })
            }}
          />
          <datalist id={`values-${index}`}>
            {column(filter.column)?.values.map((v) => (
              <option key={String(v)} value={String(v)} />
            ))}
          </datalist>
          <Button look="quiet" onPress={() => replace(index, null)}>
            Remove this condition
          </Button>
        </div>
      ))}
      {first && (
        <Button
          onPress={() =>
            onChange([...filters, { column: first.name, equals: first.values[0] ?? 0 } satisfies RowFilter])
          }
        >
          Add a condition
        </Button>
      )}
    </div>
  )
}

const scalar = (text: string) => (text !== "" && Number.isFinite(Number(text)) ? Number(text) : text)

/** Reads "0.1", "0.1, 0.2" or "1 … 5"; null for an empty text. */
export function parseCondition(text: string): Omit<RowFilter, "column"> | null {
  const trimmed = text.trim()
  if (trimmed === "") return null
  const range = /^(.*?)\s*(?:…|\.\.\.)\s*(.*)$/.exec(trimmed)
  if (range) {
    const end = (part: string) => (part === "" ? null : Number(part))
    return { range: [end(range[1]!), end(range[2]!)] }
  }
  const values = trimmed.split(",").map((part) => scalar(part.trim()))
  return values.length === 1 ? { equals: values[0]! } : { oneOf: values }
}
