import { randomUUID } from "node:crypto"
import { mkdirSync } from "node:fs"
import { readdir, readFile, rename, writeFile } from "node:fs/promises"
import path from "node:path"
import { simpleParser, type ParsedMail } from "mailparser"
import { SMTPServer } from "smtp-server"

const extension = ".eml"

/** Receives mail on a loopback port and keeps each message as a file; nothing leaves the machine. */
export async function startMailServer(port: number, directory: string): Promise<() => Promise<void>> {
  mkdirSync(directory, { recursive: true })
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ["STARTTLS", "AUTH"],
    size: 30 * 2 ** 20,
    onData: (stream, _session, done) => {
      const parts: Buffer[] = []
      stream.on("data", (part: Buffer) => parts.push(part))
      stream.on("end", () => {
        const name = `${Date.now().toString().padStart(15, "0")}-${randomUUID()}`
        // Written under another name first: a reader never sees half a message.
        const temporary = path.join(directory, `${name}.part`)
        writeFile(temporary, Buffer.concat(parts))
          .then(() => rename(temporary, path.join(directory, name + extension)))
          .then(() => done(), done)
      })
    },
  })
  await new Promise<void>((resolve, reject) => {
    server.once("error", reject)
    server.listen(port, "127.0.0.1", () => resolve())
  })
  return () => new Promise((resolve) => server.close(() => resolve()))
}

export interface LocalMail {
  readonly id: string
  readonly mail: ParsedMail
}

/** Messages that the local mail server has received, newest first. */
export async function listLocalMail(directory: string, limit = 100): Promise<readonly LocalMail[]> {
  const names = await readdir(directory).catch((error: NodeJS.ErrnoException) => {
    if (error.code === "ENOENT") return []
    throw error
  })
  const newest = names
    .filter((name) => name.endsWith(extension))
    .sort()
    .reverse()
    .slice(0, limit)
  return Promise.all(
    newest.map(async (name) => ({
      id: name.slice(0, -extension.length),
      mail: await simpleParser(await readFile(path.join(directory, name))),
    })),
  )
}
