import { useEffect, useRef } from "react"

export interface LiveChange {
  readonly kind: string
  readonly subject: string | null
  readonly share?: number
  readonly what?: string
}

/** Follows what happens in a manuscript. The browser connects again by itself after a break. */
export function useLiveChanges(manuscriptId: string, onChange: (change: LiveChange) => void): void {
  const latest = useRef(onChange)
  useEffect(() => {
    latest.current = onChange
  }, [onChange])
  useEffect(() => {
    const source = new EventSource(`/api/v1/manuscripts/${manuscriptId}/events`)
    source.addEventListener("change", (event) =>
      latest.current(JSON.parse(event.data as string) as LiveChange),
    )
    return () => source.close()
  }, [manuscriptId])
}
