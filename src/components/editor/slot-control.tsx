import { Field, Select } from "@/components/parts/field"
import type { SlotControl } from "@specs/figure-kind"
import { FiltersControl } from "./filters-control"
import { ReferencesControl } from "./references-control"
import { NumberField } from "./number-field"

/** What a slot may refer to: the columns of the panel's dataset and the manuscript's datasets. */
export interface SlotSurroundings {
  readonly columns: readonly {
    readonly name: string
    readonly unit: string | null
    readonly role: string | null
    /** A few of its distinct values, for filters. */
    readonly values: readonly (number | string)[]
  }[]
  readonly datasets: readonly string[]
}

export interface SlotControlProps {
  readonly control: SlotControl
  readonly label: string
  readonly value: unknown
  readonly surroundings: SlotSurroundings
  readonly onChange: (value: unknown) => void
}

const withUnit = (name: string, unit: string | null) => (unit ? `${name} [${unit}]` : name)

/** The control of one slot; each change goes out at once. */
export function SlotControlView({ control, label, value, surroundings, onChange }: SlotControlProps) {
  switch (control.type) {
    case "column":
      return (
        <Select
          label="Column"
          value={typeof value === "string" ? value : ""}
          onChange={(event) => onChange(event.target.value || (control.optional ? null : undefined))}
          options={[
            ...(control.optional || !value ? [{ value: "", label: "none" }] : []),
            ...surroundings.columns.map(({ name, unit }) => ({ value: name, label: withUnit(name, unit) })),
          ]}
        />
      )
    case "dataset":
      return (
        <Select
          label="Dataset"
          value={String(value ?? "")}
          onChange={(event) => onChange(event.target.value)}
          options={surroundings.datasets.map((name) => ({ value: name, label: name }))}
        />
      )
    case "choice":
      return (
        <Choice label={label} options={control.options} value={String(value ?? "null")} onChange={onChange} />
      )
    case "number":
      return (
        <NumberField
          label={control.unit ? `Value in ${control.unit}` : "Value"}
          value={typeof value === "number" ? value : null}
          min={control.min}
          max={control.max}
          step={control.step}
          onChange={onChange}
        />
      )
    case "window":
      return <WindowControl unit={control.unit} value={value} onChange={onChange} />
    case "filters":
      return <FiltersControl value={value} surroundings={surroundings} onChange={onChange} />
    case "references":
      return <ReferencesControl value={value} onChange={onChange} />
    case "text":
      return (
        <Field
          label="Text, with TeX between $ signs"
          value={typeof value === "string" ? value : ""}
          onChange={(event) => onChange(event.target.value || undefined)}
        />
      )
  }
}

function Choice({
  label,
  options,
  value,
  onChange,
}: {
  label: string
  options: readonly { readonly value: string; readonly label: string }[]
  value: string
  onChange: (value: unknown) => void
}) {
  return (
    <fieldset className="m-0 grid gap-1 border-0 p-0">
      <legend className="visually-hidden">{label}</legend>
      {options.map((option) => (
        <label key={option.value} className="flex min-h-6 items-baseline gap-2 text-small">
          <input
            type="radio"
            name={label}
            value={option.value}
            checked={option.value === value}
            onChange={() => onChange(fromChoice(option.value))}
            className="accent-ink"
          />
          {option.label}
        </label>
      ))}
    </fieldset>
  )
}

/** Choices are written as text in a sentence; "null", numbers and booleans go back into the spec as themselves. */
function fromChoice(text: string): unknown {
  if (text === "null" || text === "true" || text === "false" || /^-?\d+(\.\d+)?$/.test(text))
    return JSON.parse(text)
  return text
}

function WindowControl({
  unit,
  value,
  onChange,
}: {
  unit: string | null
  value: unknown
  onChange: (value: unknown) => void
}) {
  const [low, high] = Array.isArray(value) ? (value as (number | null)[]) : [null, null]
  const suffix = unit ? ` [${unit}]` : ""
  return (
    <div className="grid grid-cols-2 gap-3">
      <NumberField
        label={`From${suffix}`}
        hint="empty: the first point"
        value={low ?? null}
        onChange={(next) => onChange([next, high ?? null])}
      />
      <NumberField
        label={`To${suffix}`}
        hint="empty: the last point"
        value={high ?? null}
        onChange={(next) => onChange([low ?? null, next])}
      />
    </div>
  )
}
