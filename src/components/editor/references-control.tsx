import { Button } from "@/components/parts/button"
import { Field } from "@/components/parts/field"
import { NumberField } from "./number-field"

interface Reference {
  readonly exponent: number
  readonly label?: string | undefined
}

/** Guides of a given exponent. */
export function ReferencesControl({
  value,
  onChange,
}: {
  value: unknown
  onChange: (value: unknown) => void
}) {
  const references = Array.isArray(value) ? (value as Reference[]) : []
  const replace = (index: number, reference: Reference | null) =>
    onChange(references.flatMap((old, i) => (i === index ? (reference ? [reference] : []) : [old])))
  return (
    <div className="grid gap-3">
      {references.map((reference, index) => (
        <div key={index} className="grid grid-cols-[6rem_1fr] gap-2">
          <NumberField
            label="Exponent"
            value={reference.exponent}
            step={0.05}
            onChange={(exponent) => exponent !== null && replace(index, { ...reference, exponent })}
          />
          <Field
            label="Label"
            placeholder="$t^{-1/2}$"
            value={reference.label ?? ""}
            onChange={(event) => replace(index, { ...reference, label: event.target.value || undefined })}
          />
          <Button look="quiet" onPress={() => replace(index, null)}>
            Remove
          </Button>
        </div>
      ))}
      <Button onPress={() => onChange([...references, { exponent: -0.5, label: "$t^{-1/2}$" }])}>
        Add a reference slope
      </Button>
    </div>
  )
}
