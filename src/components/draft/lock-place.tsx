import { useState } from "react"
import { Button } from "@/components/parts/button"
import { GraveDialog } from "@/components/parts/dialog"
import { Field, TextArea } from "@/components/parts/field"
import { MarginNote } from "@/components/parts/note"
import type { DraftAnswer } from "@/lib/contracts/drafts"

/** The lock: what stands against it, and the sentence that confirms it. */
export function LockPlace({
  draft,
  onLock,
}: {
  draft: DraftAnswer
  onLock: (order: { confirm: string; reason?: string }) => Promise<boolean>
}) {
  const [isAsking, setAsking] = useState(false)
  const [confirm, setConfirm] = useState("")
  const [reason, setReason] = useState("")
  const open = [
    ...(draft.waitingFor.length > 0
      ? [`not signed off: ${draft.waitingFor.map(({ name }) => name).join(", ")}`]
      : []),
    ...(draft.openMustSettle > 0 ? [`threads to settle: ${draft.openMustSettle}`] : []),
  ]
  const unready = draft.figures.filter((figure) => !figure.ready)
  const lock = async () => {
    const done = await onLock({ confirm, ...(reason.trim() ? { reason } : {}) })
    if (done) setAsking(false)
  }
  return (
    <section className="grid gap-2">
      <h2 className="label m-0">Lock</h2>
      <p className="m-0">
        At submission the draft, its figure versions and their data are frozen for good, in the database
        itself.
      </p>
      {open.map((point) => (
        <MarginNote key={point} weight="caution">
          {point}
        </MarginNote>
      ))}
      {unready.length > 0 && (
        <MarginNote weight="wrong">
          No proof yet: {unready.map((figure) => figure.figureName).join(", ")}.
        </MarginNote>
      )}
      <div>
        <Button look="grave" isDisabled={unready.length > 0} onPress={() => setAsking(true)}>
          Lock {draft.title}
        </Button>
      </div>
      <GraveDialog title={`Lock ${draft.title}`} isOpen={isAsking} onClose={() => setAsking(false)}>
        <form
          className="grid gap-4"
          onSubmit={(event) => {
            event.preventDefault()
            void lock()
          }}
        >
          <p className="m-0 font-serif">
            {draft.figures.length} {draft.figures.length === 1 ? "figure" : "figures"}, digest{" "}
            <span className="font-mono">{draft.digest?.slice(0, 16)}</span>. Nobody can undo this; changes
            need the next draft.
          </p>
          {open.length > 0 && (
            <TextArea
              label="Why lock although not everything is settled"
              hint={open.join("; ")}
              value={reason}
              onChange={(event) => setReason(event.target.value)}
            />
          )}
          <Field
            label={`Type “${draft.title}” to confirm`}
            value={confirm}
            autoComplete="off"
            onChange={(event) => setConfirm(event.target.value)}
          />
          <div>
            <Button
              look="grave"
              type="submit"
              isDisabled={confirm.trim() !== draft.title || (open.length > 0 && reason.trim() === "")}
            >
              Lock {draft.title} for good
            </Button>
          </div>
        </form>
      </GraveDialog>
    </section>
  )
}
