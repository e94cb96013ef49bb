import { useState } from "react"
import { Button } from "@/components/parts/button"
import { TextArea, Tick } from "@/components/parts/field"
import { HeatMark } from "@/components/parts/heat"
import { MathText } from "@/components/parts/math-text"
import { MarginNote } from "@/components/parts/note"
import { When } from "@/components/parts/when"
import { sentenceOf } from "@/lib/client/call"
import type { ThreadAnswer } from "@/lib/contracts/threads"

/** One thread: its comments in order, a reply, and its settling. */
export function ThreadView({
  thread,
  pin,
  maySettle,
  onReply,
  onSettle,
}: {
  thread: ThreadAnswer
  /** Number of its pin on the plate, when it has a place there. */
  pin: number | null
  maySettle: boolean
  onReply: (body: string) => Promise<void>
  onSettle: (resolved: boolean) => Promise<void>
}) {
  const [isReplying, setReplying] = useState(false)
  const [problem, setProblem] = useState<string | null>(null)
  const isOpen = thread.resolvedAt === null
  const settle = async () => {
    try {
      await onSettle(isOpen)
    } catch (error) {
      setProblem(sentenceOf(error))
    }
  }
  return (
    <article
      id={`thread-${thread.id}`}
      aria-label={`Thread by ${thread.createdBy.name}`}
      className={`border-l-2 py-1 pl-3 ${isOpen ? (thread.mustSettle ? "border-work" : "border-rule") : "border-hairline"}`}
    >
      <p className="m-0 flex flex-wrap items-baseline gap-x-3">
        {pin !== null && <span className="text-small font-semibold tabular-nums">{pin}</span>}
        {isOpen ? (
          <HeatMark heat={thread.mustSettle ? "work" : "proposed"}>
            {thread.mustSettle ? "open, settle before the lock" : "open"}
          </HeatMark>
        ) : (
          <HeatMark heat="settled">resolved{thread.resolvedBy && ` by ${thread.resolvedBy.name}`}</HeatMark>
        )}
      </p>
      <ol className="m-0 list-none p-0">
        {thread.comments.map((comment) => (
          <li key={comment.id} className="py-1.5">
            <p className="m-0 text-small text-soft">
              {comment.author.name}, <When at={comment.createdAt} />
            </p>
            <p className={`m-0 font-serif whitespace-pre-line ${isOpen ? "" : "text-soft"}`}>
              <MathText text={comment.body} />
            </p>
          </li>
        ))}
      </ol>
      {problem && <MarginNote weight="wrong">{problem}</MarginNote>}
      {isReplying ? (
        <CommentForm
          label="Reply"
          act="Send reply"
          onCancel={() => setReplying(false)}
          onSend={async (body) => {
            await onReply(body)
            setReplying(false)
          }}
        />
      ) : (
        <p className="m-0 flex gap-4">
          <Button look="quiet" onPress={() => setReplying(true)}>
            Reply
          </Button>
          {maySettle && (
            <Button look="quiet" onPress={() => void settle()}>
              {isOpen ? "Resolve" : "Reopen"}
            </Button>
          )}
        </p>
      )}
    </article>
  )
}

/** Where a comment is written; keeps the text when sending fails. */
export function CommentForm({
  label,
  act,
  mayRequireSettling = false,
  onSend,
  onCancel,
}: {
  label: string
  act: string
  mayRequireSettling?: boolean
  onSend: (body: string, mustSettle: boolean) => Promise<void>
  onCancel?: () => void
}) {
  const [body, setBody] = useState("")
  const [mustSettle, setMustSettle] = useState(false)
  const [problem, setProblem] = useState<string | undefined>()
  const [isSending, setSending] = useState(false)
  const send = async () => {
    setSending(true)
    setProblem(undefined)
    try {
      await onSend(body, mustSettle)
      setBody("")
      setMustSettle(false)
    } catch (error) {
      setProblem(sentenceOf(error))
    } finally {
      setSending(false)
    }
  }
  return (
    <form
      className="grid gap-2"
      onSubmit={(event) => {
        event.preventDefault()
        void send()
      }}
    >
      <TextArea
        label={label}
        rows={3}
        value={body}
        problem={problem}
        onChange={(event) => setBody(event.target.value)}
      />
      {mayRequireSettling && (
        <Tick
          label="Must be settled before the lock"
          checked={mustSettle}
          onChange={(event) => setMustSettle(event.target.checked)}
        />
      )}
      <div className="flex gap-3">
        <Button type="submit" isDisabled={isSending || body.trim() === ""}>
          {act}
        </Button>
        {onCancel && (
          <Button look="quiet" onPress={onCancel}>
            Cancel
          </Button>
        )}
      </div>
    </form>
  )
}
