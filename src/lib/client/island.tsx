import { QueryClient, QueryClientProvider } from "@tanstack/react-query"
import { useState } from "react"

/** Root of every interactive island: one query cache, refreshed by live events rather than by polling. */
export function Island({ children }: { children: React.ReactNode }) {
  const [client] = useState(
    () =>
      new QueryClient({
        defaultOptions: { queries: { staleTime: 30_000, retry: 1, refetchOnWindowFocus: false } },
      }),
  )
  return <QueryClientProvider client={client}>{children}</QueryClientProvider>
}
