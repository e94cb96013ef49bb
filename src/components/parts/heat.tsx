/** How settled a thing is; the word, the mark and the colour always go together. */
export type Heat = "work" | "proposed" | "settled" | "stale" | "locked"

const inkClass: Record<Heat, string> = {
  work: "text-work-ink",
  proposed: "text-proposed-ink",
  settled: "text-settled-ink",
  stale: "text-settled-ink",
  locked: "text-locked-ink",
}
const markClass: Record<Heat, string> = {
  work: "text-work",
  proposed: "text-proposed",
  settled: "text-settled",
  stale: "text-settled",
  locked: "text-locked",
}
const fillClass: Record<Heat, string> = {
  work: "bg-work",
  proposed: "bg-proposed",
  settled: "bg-settled",
  stale: "bg-settled",
  locked: "bg-locked",
}

function MarkShape({ heat }: { heat: Heat }) {
  switch (heat) {
    case "work":
      return <circle cx="7" cy="7" r="4.75" fill="none" stroke="currentColor" strokeWidth="1.75" />
    case "proposed":
      return (
        <>
          <circle cx="7" cy="7" r="4.75" fill="none" stroke="currentColor" strokeWidth="1.5" />
          <path d="M7 2.25a4.75 4.75 0 0 0 0 9.5z" fill="currentColor" />
        </>
      )
    case "settled":
      return <circle cx="7" cy="7" r="5.25" fill="currentColor" />
    case "stale":
      return (
        <circle
          cx="7"
          cy="7"
          r="4.75"
          fill="none"
          stroke="currentColor"
          strokeWidth="1.75"
          strokeDasharray="3.7 3.76"
        />
      )
    case "locked":
      return (
        <>
          <rect x="2" y="4.5" width="10" height="8" fill="currentColor" />
          <path d="M3.5 2.25h7" stroke="currentColor" strokeWidth="1.75" />
        </>
      )
  }
}

/** A state's mark with its word. The mark is decoration: the word carries the meaning for screen readers. */
export function HeatMark({ heat, children }: { heat: Heat; children: React.ReactNode }) {
  return (
    <span className={`inline-flex items-baseline gap-1.5 text-small ${inkClass[heat]}`}>
      <svg
        aria-hidden="true"
        viewBox="0 0 14 14"
        className={`size-3.5 flex-none translate-y-[2px] ${markClass[heat]}`}
      >
        <MarkShape heat={heat} />
      </svg>
      <span>{children}</span>
    </span>
  )
}

export interface HeatSegment {
  readonly heat: Heat
  /** What the segment stands for: "Figure 1, pinned". */
  readonly label: string
  readonly href?: string
}

/** A draft's whole state in one strip, a segment per figure. */
export function HeatStrip({ segments, title }: { segments: readonly HeatSegment[]; title: string }) {
  return (
    <ol aria-label={title} className="m-0 flex h-2 w-full list-none gap-px p-0">
      {segments.map((segment, index) => (
        <li
          key={index}
          className={`relative min-w-0 flex-1 ${segment.heat === "stale" ? "" : fillClass[segment.heat]}`}
        >
          {segment.heat === "stale" && (
            <span className="absolute inset-0 border-2 border-dashed border-settled" aria-hidden="true" />
          )}
          {segment.href ? (
            <a href={segment.href} title={segment.label} className="absolute inset-x-0 -inset-y-2 block">
              <span className="visually-hidden">{segment.label}</span>
            </a>
          ) : (
            <span className="visually-hidden">{segment.label}</span>
          )}
        </li>
      ))}
    </ol>
  )
}
