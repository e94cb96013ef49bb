import { spawn, type ChildProcess } from "node:child_process"
import { randomBytes } from "node:crypto"
import { mkdtempSync, rmSync } from "node:fs"
import net from "node:net"
import os from "node:os"
import path from "node:path"
import { fileURLToPath } from "node:url"
import { freshDatabase, type FreshDatabase } from "./fresh-database"

const root = fileURLToPath(new URL("../..", import.meta.url))

async function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = net.createServer().once("error", reject)
    server.listen(0, "127.0.0.1", () => {
      const { port } = server.address() as net.AddressInfo
      server.close(() => resolve(port))
    })
  })
}

export interface RunningApp {
  readonly url: string
  readonly authSecret: string
  readonly database: FreshDatabase
  /** Where the local mail server puts what it receives. */
  readonly mailDirectory: string
  readonly stop: () => Promise<void>
}

/** Starts a program and waits for its word that it is ready. */
async function startProgram(args: readonly string[], env: NodeJS.ProcessEnv): Promise<ChildProcess> {
  const child = spawn(process.execPath, args, {
    cwd: root,
    env,
    stdio: ["ignore", "inherit", "inherit", "ipc"],
  })
  await new Promise<void>((resolve, reject) => {
    child.once("message", () => resolve())
    child.once("exit", (code) => reject(new Error(`${args[0]} ended with code ${code} before it was ready.`)))
  })
  return child
}

async function endProgram(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return
  const exit = new Promise((resolve) => child.once("exit", resolve))
  child.kill("SIGTERM")
  await exit
}

/**
 * The built application against a database of its own.
 *
 * @param environment variables on top of the usual ones
 * @param parts which programs run beside the web server
 */
export async function startApp(
  environment: Readonly<Record<string, string>> = {},
  parts: { readonly worker?: boolean; readonly mail?: boolean } = {},
): Promise<RunningApp> {
  const database = await freshDatabase()
  const port = await freePort()
  const url = `http://127.0.0.1:${port}`
  const authSecret = randomBytes(36).toString("base64url")
  const mailDirectory = mkdtempSync(path.join(os.tmpdir(), "afterquench-mail-"))
  const mailPort = await freePort()
  const env = {
    ...process.env,
    NODE_ENV: "production",
    PORT: String(port),
    PUBLIC_URL: url,
    AUTH_SECRET: authSecret,
    DATABASE_URL: database.appUrl,
    DATABASE_OWNER_URL: database.ownerUrl,
    SMTP_URL: `smtp://127.0.0.1:${mailPort}`,
    MAIL_DIRECTORY: mailDirectory,
    ...(parts.mail ? { LOCAL_MAIL_PORT: String(mailPort) } : {}),
    ...environment,
  }
  const children: ChildProcess[] = []
  const start = async (file: string) => children.push(await startProgram([path.join(root, file)], env))
  const stop = async () => {
    await Promise.all(children.map(endProgram))
    await database.drop()
    rmSync(mailDirectory, { recursive: true, force: true })
  }
  try {
    if (parts.mail) await start("dist/local.mjs")
    if (parts.worker) await start("dist/worker.mjs")
    await start("server.mjs")
  } catch (error) {
    await stop()
    throw error
  }
  return { url, authSecret, database, mailDirectory, stop }
}
