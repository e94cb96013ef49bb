import { Problem } from "@/lib/contracts/problems"

/** Uploads that this process takes at the same time: each holds a connection and a transaction while it lasts. */
const atOnce = 5
/** An upload without a byte for so long is given up, or it would hold its turn for ever. */
const longestSilenceMs = 60_000

let running = 0
const waiting: (() => void)[] = []

/** Runs an upload when it is its turn. Until then its bytes are not read, so the client waits. */
export async function inTurn<T>(upload: () => Promise<T>): Promise<T> {
  if (running >= atOnce) await new Promise<void>((resolve) => waiting.push(resolve))
  else running += 1
  try {
    return await upload()
  } finally {
    const next = waiting.shift()
    if (next) next()
    else running -= 1
  }
}

/** The pieces of a body as they come. @throws Problem `unavailable` after a silence of a minute */
export async function* withoutSilence(
  pieces: AsyncIterable<Uint8Array>,
  limitMs = longestSilenceMs,
): AsyncGenerator<Uint8Array> {
  const iterator = pieces[Symbol.asyncIterator]()
  let timer: NodeJS.Timeout | undefined
  try {
    for (;;) {
      const silence = new Promise<never>((_, reject) => {
        timer = setTimeout(
          () => reject(new Problem("unavailable", "No more of the file came; nothing was stored.")),
          limitMs,
        )
      })
      const { done, value } = await Promise.race([iterator.next(), silence])
      clearTimeout(timer)
      if (done) return
      yield value
    }
  } finally {
    clearTimeout(timer)
    // Not awaited: a body that fell silent may never settle.
    void iterator.return?.()
  }
}
