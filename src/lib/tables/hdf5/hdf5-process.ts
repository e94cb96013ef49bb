import { type ChildProcess, type ForkOptions, fork } from "node:child_process"
import { existsSync } from "node:fs"
import { createRequire } from "node:module"
import { fileURLToPath, pathToFileURL } from "node:url"
import { ArrayFailure } from "../arrays/array-source"
import { IntakeRefusal } from "../intake-codes"
import type { Hdf5Answer, Hdf5Listing, Hdf5Question } from "./hdf5-protocol"

/**
 * The process that holds the HDF5 library. Each question has a time limit; a process that does not answer or dies ends
 * the reading of its file and nothing else.
 */
export class Hdf5Process {
  readonly #child: ChildProcess

  constructor(readonly timeoutMs: number) {
    this.#child = forkReader()
  }

  /** @throws IntakeRefusal hdf5-damaged, hdf5-timeout, hdf5-crashed */
  async list(path: string): Promise<Hdf5Listing> {
    const answer = await this.#ask({ ask: "list", path })
    if ("failure" in answer) throw new IntakeRefusal(answer.failure, answer.values)
    if (!("listing" in answer)) throw new IntakeRefusal("hdf5-damaged")
    return answer.listing
  }

  /** @throws ArrayFailure hdf5-read, hdf5-filter; IntakeRefusal hdf5-timeout, hdf5-crashed */
  async read(question: Omit<Extract<Hdf5Question, { ask: "read" }>, "ask">): Promise<Hdf5Answer> {
    const answer = await this.#ask({ ask: "read", ...question })
    if ("failure" in answer) throw new ArrayFailure(answer.failure, answer.values)
    return answer
  }

  close(): void {
    this.#child.kill("SIGKILL")
  }

  #ask(question: Hdf5Question): Promise<Hdf5Answer> {
    const child = this.#child
    if (child.exitCode !== null || child.signalCode !== null)
      return Promise.reject(new IntakeRefusal("hdf5-crashed"))
    return new Promise((resolve, reject) => {
      const settle = (action: () => void) => {
        clearTimeout(timer)
        child.off("message", answered)
        child.off("exit", died)
        child.off("error", died)
        action()
      }
      const answered = (message: unknown) => settle(() => resolve(message as Hdf5Answer))
      const died = () => settle(() => reject(new IntakeRefusal("hdf5-crashed")))
      const timer = setTimeout(() => {
        settle(() => reject(new IntakeRefusal("hdf5-timeout", { n: Math.round(this.timeoutMs / 1000) })))
        child.kill("SIGKILL")
      }, this.timeoutMs)
      child.on("message", answered)
      child.on("exit", died)
      child.on("error", died)
      child.send(question)
    })
  }
}

/** Beside a bundled program lies a bundled reader; from sources it is compiled as it is loaded. */
function forkReader(): ChildProcess {
  const bundled = fileURLToPath(new URL("./hdf5-child.mjs", import.meta.url))
  const options: ForkOptions = {
    serialization: "advanced",
    stdio: ["ignore", "ignore", "inherit", "ipc"],
    // No secrets of the server reach the process that reads a stranger's file.
    env: { NODE_ENV: process.env.NODE_ENV ?? "production" },
  }
  const memory = "--max-old-space-size=512"
  if (existsSync(bundled)) return fork(bundled, [], { ...options, execArgv: [memory] })
  const source = fileURLToPath(new URL("./hdf5-child.ts", import.meta.url))
  const tsx = pathToFileURL(createRequire(import.meta.url).resolve("tsx")).href
  return fork(source, [], { ...options, execArgv: [memory, "--import", tsx] })
}
