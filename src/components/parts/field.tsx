import { useId } from "react"

const control =
  "w-full rounded-sheet border border-rule bg-raised px-2.5 text-ink placeholder:text-soft min-h-9 " +
  "focus:outline-2 focus:outline-offset-0 focus:outline-ink aria-[invalid=true]:border-wrong"

interface FieldFrame {
  readonly label: string
  /** What it accepts, under the label. */
  readonly hint?: string | undefined
  /** What is wrong and what to do. */
  readonly problem?: string | undefined
}

function Frame({
  id,
  label,
  hint,
  problem,
  children,
}: FieldFrame & { id: string; children: React.ReactNode }) {
  return (
    <div className="grid gap-1">
      <label htmlFor={id} className="label">
        {label}
      </label>
      {hint && (
        <p id={`${id}-hint`} className="m-0 text-small text-soft">
          {hint}
        </p>
      )}
      {children}
      {problem && (
        <p id={`${id}-problem`} role="alert" className="m-0 text-small text-wrong-ink">
          {problem}
        </p>
      )}
    </div>
  )
}

const described = (id: string, hint?: string, problem?: string) => ({
  "aria-describedby":
    [hint && `${id}-hint`, problem && `${id}-problem`].filter(Boolean).join(" ") || undefined,
  "aria-invalid": problem ? true : undefined,
})

/** A one-line text input with its label, hint and problem. Other props go to the input. */
export function Field({
  label,
  hint,
  problem,
  ...props
}: FieldFrame & Omit<React.ComponentProps<"input">, "className" | "id">) {
  const id = useId()
  return (
    <Frame id={id} label={label} hint={hint} problem={problem}>
      <input id={id} {...described(id, hint, problem)} {...props} className={control} />
    </Frame>
  )
}

/** The same for several lines. */
export function TextArea({
  label,
  hint,
  problem,
  ...props
}: FieldFrame & Omit<React.ComponentProps<"textarea">, "className" | "id">) {
  const id = useId()
  return (
    <Frame id={id} label={label} hint={hint} problem={problem}>
      <textarea
        id={id}
        rows={4}
        {...described(id, hint, problem)}
        {...props}
        className={`${control} py-1.5 font-serif`}
      />
    </Frame>
  )
}

/** The same for a choice of a few. */
export function Select({
  label,
  hint,
  problem,
  options,
  ...props
}: FieldFrame &
  Omit<React.ComponentProps<"select">, "className" | "id"> & {
    options: readonly { readonly value: string; readonly label: string }[]
  }) {
  const id = useId()
  return (
    <Frame id={id} label={label} hint={hint} problem={problem}>
      <select id={id} {...described(id, hint, problem)} {...props} className={control}>
        {options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
    </Frame>
  )
}

/** A tick box whose label says what ticking means. */
export function Tick({
  label,
  ...props
}: { label: string } & Omit<React.ComponentProps<"input">, "type" | "className">) {
  const id = useId()
  return (
    <label htmlFor={id} className="inline-flex min-h-6 items-center gap-2 text-small">
      <input id={id} type="checkbox" {...props} className="size-4 accent-ink" />
      {label}
    </label>
  )
}
