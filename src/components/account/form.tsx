import { useState } from "react"
import { Button, type ButtonLook } from "@/components/parts/button"
import { Field } from "@/components/parts/field"
import { MarginNote } from "@/components/parts/note"
import { sentenceOf } from "@/lib/client/call"
import { Problem } from "@/lib/contracts/problems"

export interface FormField {
  readonly name: string
  readonly label: string
  readonly hint?: string
  readonly type?: string
  readonly autoComplete?: string
  readonly initial?: string
}

/** A short form of text fields: one act, problems at their places, nothing lost when sending fails. */
export function Form({
  fields,
  act,
  look = "act",
  children,
  onSend,
}: {
  fields: readonly FormField[]
  act: string
  look?: ButtonLook
  /** More controls, between the fields and the button. */
  children?: React.ReactNode
  /** Sends the values; what it returns is shown as done. */
  onSend: (values: Readonly<Record<string, string>>) => Promise<string | void>
}) {
  const [values, setValues] = useState<Record<string, string>>(() =>
    Object.fromEntries(fields.map(({ name, initial = "" }) => [name, initial])),
  )
  const [error, setError] = useState<unknown>(null)
  const [done, setDone] = useState<string | null>(null)
  const [isSending, setSending] = useState(false)
  const issues = error instanceof Problem ? error.errors : []
  const placed = fields.map(
    ({ name }) => issues.find((issue) => issue.pointer.split("/").includes(name))?.message,
  )
  const send = async () => {
    setSending(true)
    setError(null)
    try {
      setDone((await onSend(values)) ?? null)
    } catch (caught) {
      setError(caught)
    } finally {
      setSending(false)
    }
  }
  if (done !== null)
    return (
      <p className="font-serif" role="status">
        {done}
      </p>
    )
  return (
    <form
      className="grid gap-4"
      noValidate
      onSubmit={(event) => {
        event.preventDefault()
        void send()
      }}
    >
      {fields.map((field, index) => (
        <Field
          key={field.name}
          label={field.label}
          hint={field.hint}
          type={field.type ?? "text"}
          name={field.name}
          autoComplete={field.autoComplete}
          required
          value={values[field.name]}
          problem={placed[index]}
          onChange={(event) => setValues({ ...values, [field.name]: event.target.value })}
        />
      ))}
      {children}
      {error !== null && placed.every((message) => message === undefined) && (
        <MarginNote weight="wrong">{sentenceOf(error)}</MarginNote>
      )}
      <div>
        <Button look={look} type="submit" isDisabled={isSending}>
          {act}
        </Button>
      </div>
    </form>
  )
}

/** A narrow page with one heading, for what one does before being inside. */
export function Threshold({ title, children }: { title: string; children: React.ReactNode }) {
  return (
    <div className="mx-auto grid max-w-md gap-6 px-4 py-6">
      <h1 className="m-0 text-title">{title}</h1>
      {children}
    </div>
  )
}
