/** How long a job may take on a busy machine. */
const patienceMs = 90_000

/** Asks again until there is an answer; for work that the job queue does in its own time. */
export async function until<T>(what: string, ask: () => Promise<T | undefined | null | false>): Promise<T> {
  const deadline = Date.now() + patienceMs
  for (;;) {
    const answer = await ask()
    if (answer) return answer
    if (Date.now() > deadline) throw new Error(`${what} did not happen within ${patienceMs / 1000} s.`)
    await new Promise((resolve) => setTimeout(resolve, 50))
  }
}
