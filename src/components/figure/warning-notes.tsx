import { MarginNote } from "@/components/parts/note"

interface Warning {
  readonly code: string
  readonly severity: "note" | "caution" | "severe"
  readonly message: string
  readonly where: string
}

const order = { severe: 0, caution: 1, note: 2 }

/** Warnings in the margin, gravest first; the same sentence about several curves is said once. */
export function WarningNotes({ warnings }: { warnings: readonly Warning[] }) {
  const byMessage = new Map<string, Warning & { places: string[] }>()
  for (const warning of warnings) {
    const known = byMessage.get(warning.message)
    if (known) known.places.push(warning.where)
    else byMessage.set(warning.message, { ...warning, places: [warning.where] })
  }
  const all = [...byMessage.values()].sort((a, b) => order[a.severity] - order[b.severity])
  if (all.length === 0) return null
  return (
    <section className="grid gap-3" aria-label="Warnings">
      <h2 className="label m-0">What a referee would ask</h2>
      {all.map((warning) => (
        <MarginNote key={warning.code + warning.message} weight={warning.severity}>
          {warning.message} <span className="text-soft">({warning.places.join("; ")})</span>
        </MarginNote>
      ))}
    </section>
  )
}
