import { fork } from "node:child_process"
import { fileURLToPath } from "node:url"

/** A job that failed for a reason that a person can do something about. */
export class JobFailure extends Error {}

export interface ChildMessage {
  readonly type: "progress" | "failure" | "done"
  readonly share?: number
  readonly what?: string
  readonly message?: string
  readonly errors?: readonly object[]
}

/**
 * Runs one of our programs on one piece of work in a process of its own, with bounds on time and memory: whatever a
 * hostile file does there, the worker lives on.
 *
 * @param program name of a file in dist/, beside the worker
 * @throws JobFailure with a sentence for the person who waits
 */
export async function runInChild(
  program: string,
  work: Readonly<Record<string, string>>,
  bounds: {
    readonly timeoutMs: number
    readonly memoryMb: number
    readonly signal?: AbortSignal | undefined
  },
  onProgress: (share: number, what: string) => void,
): Promise<ChildMessage> {
  const child = fork(fileURLToPath(new URL(`./${program}.mjs`, import.meta.url)), [JSON.stringify(work)], {
    execArgv: [`--max-old-space-size=${bounds.memoryMb}`],
    stdio: ["ignore", "inherit", "inherit", "ipc"],
  })
  return new Promise<ChildMessage>((resolve, reject) => {
    let answer: ChildMessage | undefined
    let timedOut = false
    const stop = () => child.kill("SIGKILL")
    const timer = setTimeout(() => {
      timedOut = true
      stop()
    }, bounds.timeoutMs)
    bounds.signal?.addEventListener("abort", stop)
    child.on("message", (message: ChildMessage) => {
      if (message.type === "progress") onProgress(message.share ?? 0, message.what ?? "")
      else answer = message
    })
    child.once("error", reject)
    child.once("exit", (code, signal) => {
      clearTimeout(timer)
      bounds.signal?.removeEventListener("abort", stop)
      if (answer?.type === "done") resolve(answer)
      else if (answer?.type === "failure") resolve(answer)
      else if (timedOut)
        reject(
          new JobFailure(`It did not end within ${Math.round(bounds.timeoutMs / 1000)} s and was stopped.`),
        )
      else if (signal === "SIGABRT" || code === 134)
        reject(new JobFailure(`It needed more than ${bounds.memoryMb} MB of memory and was stopped.`))
      else reject(new Error(`${program} ended with ${signal ?? `code ${code}`} and without a word.`))
    })
  })
}

/** The other side: what a program of `runInChild` was asked to do. */
export function workOfChild<Work>(): Work {
  return JSON.parse(process.argv[2] ?? "{}") as Work
}

/** Tells the worker; progress goes out at most every quarter second. */
export const tellWorker = (() => {
  let last = 0
  return (message: ChildMessage): void => {
    const now = Date.now()
    if (message.type === "progress" && now - last < 250) return
    last = now
    process.send?.(message)
  }
})()
