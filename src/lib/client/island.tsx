import { QueryClient, QueryClientProvider } from "@tanstack/react-query"
import { useState } from "react"
import { rememberBoxes, type MathBox } from "./typeset"

/** Root of every interactive island: one query cache, refreshed by live events rather than by polling. */
export function Island({
  boxes,
  children,
}: {
  /** Formulas that the server has set for this page. */
  boxes?: Readonly<Record<string, MathBox | null>>
  children: React.ReactNode
}) {
  useState(() => boxes && rememberBoxes(boxes))
  const [client] = useState(
    () =>
      new QueryClient({
        defaultOptions: { queries: { staleTime: 30_000, retry: 1, refetchOnWindowFocus: false } },
      }),
  )
  return <QueryClientProvider client={client}>{children}</QueryClientProvider>
}
