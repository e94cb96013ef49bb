import { useId } from "react"
import type { SpecIssue } from "@specs/spec-error"

/** The spec itself, as JSON: the same document as the sentence, for whoever would rather write it. */
export function SpecSheet({
  text,
  issues,
  onText,
}: {
  text: string
  issues: readonly SpecIssue[]
  onText: (text: string) => void
}) {
  const id = useId()
  return (
    <details className="mt-8 border-t border-hairline pt-3">
      <summary className="label min-h-6 cursor-pointer">The spec as JSON</summary>
      <p id={`${id}-hint`} className="mt-2 mb-2 text-small text-soft">
        Edits here and in the sentence are one document. <a href="/schema/figure-spec.v1.json">Its schema</a>.
      </p>
      <textarea
        aria-label="Figure spec as JSON"
        aria-describedby={`${id}-hint ${id}-issues`}
        aria-invalid={issues.length > 0}
        spellCheck={false}
        value={text}
        onChange={(event) => onText(event.target.value)}
        className="h-96 w-full resize-y rounded-sheet border border-rule bg-sunk p-3 font-mono text-small leading-5"
      />
      <ul id={`${id}-issues`} className="m-0 list-none p-0 text-small text-wrong-ink" aria-live="polite">
        {issues.map((issue) => (
          <li key={issue.pointer + issue.message}>
            <span className="font-mono">{issue.pointer || "/"}</span>: {issue.message}
          </li>
        ))}
      </ul>
    </details>
  )
}
