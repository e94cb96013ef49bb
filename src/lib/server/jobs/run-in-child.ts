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

/** How a piece of work ended; "cancelled" when it was stopped because it was not wanted any more. */
export type ChildAnswer =
  | { readonly type: "done" | "cancelled" }
  | { readonly type: "failure"; readonly message: string; readonly errors?: readonly object[] | undefined }

export interface Bounds {
  readonly timeoutMs: number
  readonly memoryMb: number
}

interface Watch {
  readonly onProgress?: (share: number, what: string) => void
  /** Asked every second; the work is stopped when it says no. */
  readonly isWanted?: () => Promise<boolean>
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
  { timeoutMs, memoryMb }: Bounds,
  { onProgress, isWanted }: Watch = {},
): Promise<ChildAnswer> {
  const child = fork(fileURLToPath(new URL(`./${program}.mjs`, import.meta.url)), [JSON.stringify(work)], {
    execArgv: [`--max-old-space-size=${memoryMb}`],
    stdio: ["ignore", "inherit", "inherit", "ipc"],
  })
  let answer: ChildAnswer | undefined
  let stopped: "timed out" | "cancelled" | undefined
  const stop = (reason: typeof stopped) => {
    stopped ??= reason
    child.kill("SIGKILL")
  }
  const timer = setTimeout(() => stop("timed out"), timeoutMs)
  const watch = setInterval(() => {
    isWanted?.().then(
      (wanted) => wanted || stop("cancelled"),
      (error: Error) =>
        console.error(`worker: whether ${program} is still wanted is unknown: ${error.message}`),
    )
  }, 1000)
  child.on("message", (message: ChildMessage) => {
    if (message.type === "progress") onProgress?.(message.share ?? 0, message.what ?? "")
    else if (message.type === "done") answer = { type: "done" }
    else answer = { type: "failure", message: message.message ?? "", errors: message.errors }
  })
  try {
    const [code, signal] = await new Promise<[number | null, NodeJS.Signals | null]>((resolve, reject) => {
      child.once("error", reject)
      child.once("exit", (...end) => resolve(end))
    })
    if (answer) return answer
    if (stopped === "cancelled") return { type: "cancelled" }
    if (stopped === "timed out")
      throw new JobFailure(`It did not end within ${Math.round(timeoutMs / 1000)} s and was stopped.`)
    if (signal === "SIGABRT" || code === 134)
      throw new JobFailure(`It needed more than ${memoryMb} MB of memory and was stopped.`)
    throw new Error(`${program} ended with ${signal ?? `code ${code}`} and without a word.`)
  } finally {
    clearTimeout(timer)
    clearInterval(watch)
  }
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
