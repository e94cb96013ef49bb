const looks = {
  note: { mark: "○", word: "Note", className: "border-rule" },
  caution: { mark: "△", word: "Caution", className: "border-proposed" },
  severe: { mark: "▲", word: "Serious", className: "border-work" },
  wrong: { mark: "✕", word: "Must fix", className: "border-wrong" },
} as const

export type NoteWeight = keyof typeof looks

/** A marginal note: one sentence and what to do, told apart by mark, word and rule. */
export function MarginNote({
  weight,
  children,
  action,
}: {
  weight: NoteWeight
  children: React.ReactNode
  action?: React.ReactNode
}) {
  const look = looks[weight]
  return (
    <div className={`border-l-2 pl-3 text-small ${look.className}`}>
      <p className="m-0">
        <span className="font-semibold">
          <span aria-hidden="true">{look.mark} </span>
          {look.word}.
        </span>{" "}
        {children}
      </p>
      {action && <div className="mt-1">{action}</div>}
    </div>
  )
}
