import { useState } from "react"
import { Field } from "@/components/parts/field"

const plain = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/

/** A number that is sent on as soon as it is one; empty means none. Keeps what is being typed until it is a number. */
export function NumberField({
  label,
  hint,
  value,
  min,
  max,
  step,
  onChange,
}: {
  label: string
  hint?: string
  value: number | null
  min?: number | undefined
  max?: number | undefined
  step?: number | undefined
  onChange: (value: number | null) => void
}) {
  const [draft, setDraft] = useState<string | null>(null)
  const text = draft ?? (value === null ? "" : String(value))
  const problem = problemWith(text, min, max)
  return (
    <Field
      label={label}
      hint={hint}
      inputMode="decimal"
      value={text}
      problem={draft === null ? undefined : problem}
      onChange={(event) => {
        const next = event.target.value.trim()
        setDraft(next)
        if (next === "") onChange(null)
        else if (!problemWith(next, min, max)) onChange(Number(next))
      }}
      onKeyDown={(event) => {
        const by = event.key === "ArrowUp" ? 1 : event.key === "ArrowDown" ? -1 : 0
        if (by === 0 || step === undefined || problem || text === "") return
        event.preventDefault()
        const next = Number((Number(text) + by * step).toPrecision(12))
        if (problemWith(String(next), min, max)) return
        setDraft(null)
        onChange(next)
      }}
      onBlur={() => setDraft(null)}
    />
  )
}

function problemWith(text: string, min?: number, max?: number): string | undefined {
  if (text === "") return undefined
  if (!plain.test(text)) return `“${text}” is not a number.`
  if (min !== undefined && Number(text) < min) return `At least ${min}.`
  if (max !== undefined && Number(text) > max) return `At most ${max}.`
  return undefined
}
