import { Ledger } from "@/components/parts/ledger"
import { When } from "@/components/parts/when"
import type { EventAnswer } from "@/lib/contracts/events"

/** What an event says after the name of who did it. */
const words: Record<string, string> = {
  "manuscript.created": "started the manuscript",
  "manuscript.changed": "changed the manuscript",
  "dataset-version.uploaded": "uploaded",
  "dataset-version.read": "read",
  "dataset-version.failed": "could not read",
  "dataset-version.corrected": "corrected the columns of",
  "dataset-version.accepted": "accepted",
  "dataset-version.refused": "refused",
  "figure.created": "added",
  "figure.changed": "changed title or caption of",
  "figure-version.saved": "saved",
  "figure-version.computed": "computed",
  "figure-version.failed": "could not compute",
  "thread.started": "started a thread on",
  "comment.added": "replied on",
  "thread.resolved": "resolved a thread on",
  "thread.reopened": "reopened a thread on",
  "thread.marked": "marked a thread on",
  "draft.opened": "opened",
  "draft.pinned": "pinned figures to",
  "draft.signed-off": "signed off",
  "draft.sign-off-withdrawn": "withdrew the sign-off from",
  "draft.locked": "locked",
  "bundle.made": "made the bundle of",
  "bundle.failed": "could not make the bundle of",
}

function subjectOf({ kind, data }: EventAnswer): string {
  const { dataset, figure, number } = (data ?? {}) as { dataset?: string; figure?: string; number?: number }
  if (kind.startsWith("draft") || kind.startsWith("bundle")) return `Draft ${number}`
  const name = dataset ?? figure
  return name === undefined ? "" : `${name}${number === undefined ? "" : `, version ${number}`}`
}

/** Who did what when, newest first. */
export function HistoryPage({ events, older }: { events: readonly EventAnswer[]; older: string | null }) {
  return (
    <div className="sheet">
      <div className="across min-w-0">
        <h1 className="mt-0 mb-4 text-title">History</h1>
        <Ledger
          caption="What happened"
          rows={events}
          rowKey={(event) => String(event.id)}
          columns={[
            { key: "at", heading: "When", cell: (event) => <When at={event.at} /> },
            { key: "who", heading: "Who", cell: (event) => event.person?.name ?? "the product" },
            {
              key: "what",
              heading: "What",
              cell: (event) => `${words[event.kind] ?? event.kind} ${subjectOf(event)}`,
            },
          ]}
        />
        {older && (
          <p>
            <a href={older}>Older</a>
          </p>
        )}
      </div>
    </div>
  )
}
