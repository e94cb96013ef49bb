import { spawn } from "node:child_process"
import path from "node:path"
import { fileURLToPath } from "node:url"
import { ensureBuild } from "./build.mjs"
import { ensurePostgres } from "./debian.mjs"
import { ensureNode, ensurePackages } from "./packages.mjs"
import { freePort, keptSecrets, portAnswers, startPostgres } from "./postgres.mjs"
import { run, say, SetUpError } from "./say.mjs"

const root = fileURLToPath(new URL("..", import.meta.url))
const data = path.join(root, ".data")
const develop = process.argv.includes("--dev")
const defaultPort = 4321

/** Stops in the reverse order of starting. */
const stops = []
let stopping = false

async function stopAll(code) {
  if (stopping) {
    say("Stopping at once.")
    process.exit(1)
  }
  stopping = true
  for (const stop of stops.reverse()) await stop()
  process.exit(code)
}

/** Starts one of our programs; when it ends by itself everything ends. */
function startProgram(name, args, env) {
  const child = spawn(process.execPath, args, {
    cwd: root,
    env,
    // In a process group of its own, so that Ctrl-C reaches it through us and in order; the channel tells it when we die.
    detached: true,
    stdio: ["ignore", "inherit", "inherit", "ipc"],
  })
  const exit = new Promise((resolve) => child.once("exit", resolve))
  child.once("exit", (code) => {
    if (stopping) return
    say(`${name} ended unexpectedly (code ${code}); stopping. Its messages are above.`)
    void stopAll(1)
  })
  stops.push(async () => {
    if (child.exitCode === null && child.signalCode === null) child.kill("SIGTERM")
    const patience = setTimeout(() => child.kill("SIGKILL"), 15_000)
    await exit
    clearTimeout(patience)
  })
  return child
}

/** Runs one of our programs to its end. */
function runProgram(name, args, env) {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, args, { cwd: root, env, stdio: ["ignore", 2, 2] })
    child.once("exit", (code) =>
      code === 0 ? resolve() : reject(new SetUpError(`${name} failed (code ${code}); its message is above.`)),
    )
  })
}

async function choosePort() {
  if (process.env.PORT) {
    if (await portAnswers(Number(process.env.PORT)))
      throw new SetUpError(
        `Port ${process.env.PORT} is in use. Set PORT to another one, or stop what uses it.`,
      )
    return Number(process.env.PORT)
  }
  if (!(await portAnswers(defaultPort))) return defaultPort
  const port = await freePort()
  say(`Port ${defaultPort} is in use; taking ${port}. Set PORT to choose.`)
  return port
}

async function database(secrets) {
  if (process.env.DATABASE_URL) {
    return {
      ownerUrl: process.env.DATABASE_OWNER_URL ?? process.env.DATABASE_URL,
      applicationUrl: process.env.DATABASE_URL,
    }
  }
  const programs = ensurePostgres()
  const server = await startPostgres({ programs, wanted: path.join(data, "postgres"), secrets })
  stops.push(server.stop)
  return server
}

/** The environment of our programs: what is set stays, what is missing is filled in for this machine. */
async function environment(secrets, addresses, port) {
  const publicUrl = process.env.PUBLIC_URL ?? `http://127.0.0.1:${port}`
  const own = {
    NODE_ENV: "production",
    LOCAL_MODE: process.env.PUBLIC_URL ? "false" : "true",
    HOST: "127.0.0.1",
    PUBLIC_URL: publicUrl,
    AUTH_SECRET: secrets.authSecret,
    ...process.env,
    PORT: String(port),
    DATABASE_URL: addresses.applicationUrl,
    DATABASE_OWNER_URL: addresses.ownerUrl,
  }
  if (!own.SMTP_URL) {
    own.LOCAL_MAIL_PORT = String(await freePort())
    own.SMTP_URL = `smtp://127.0.0.1:${own.LOCAL_MAIL_PORT}`
    own.MAIL_DIRECTORY = path.join(data, "mail")
  }
  if (!own.OIDC_ISSUER && own.LOCAL_MODE === "true") {
    own.LOCAL_OIDC_PORT = String(await freePort())
    own.OIDC_ISSUER = `http://127.0.0.1:${own.LOCAL_OIDC_PORT}`
    own.OIDC_CLIENT_ID = "afterquench"
    own.OIDC_CLIENT_SECRET = secrets.authSecret.slice(0, 32)
    own.OIDC_NAME = "the local identity provider"
  }
  return own
}

const listening = (child) =>
  new Promise((resolve, reject) => {
    child.once("message", resolve)
    child.once("exit", () => reject(new SetUpError("The web server did not start; its message is above.")))
  })

await run(async () => {
  ensureNode()
  for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.on(signal, () => void stopAll(0))
  try {
    ensurePackages(root)
    const secrets = keptSecrets(path.join(data, "secrets.json"))
    const port = await choosePort()
    const addresses = await database(secrets)
    ensureBuild(root)
    const env = await environment(secrets, addresses, port)
    const program = (name) => path.join(root, "dist", `${name}.mjs`)
    await runProgram("The migration", [program("migrate")], { ...env, DATABASE_URL: addresses.ownerUrl })
    if (env.LOCAL_MAIL_PORT || env.LOCAL_OIDC_PORT)
      startProgram("The local mail and identity server", [program("local")], env)
    startProgram("The worker", [program("worker")], env)
    if (env.LOCAL_MODE === "true") await runProgram("Seeding the demo", [program("seed-demo")], env)
    const web = develop
      ? startProgram(
          "The development server",
          [
            path.join(root, "node_modules/astro/astro.js"),
            "dev",
            "--port",
            String(port),
            "--host",
            "127.0.0.1",
          ],
          { ...env, NODE_ENV: "development", ASTRO_TELEMETRY_DISABLED: "1" },
        )
      : startProgram("The web server", [path.join(root, "server.mjs")], env)
    if (!develop) await listening(web)
    say(`\nAfterquench is at ${env.PUBLIC_URL}`)
    if (env.LOCAL_MODE === "true")
      say(
        "The sign-in page offers the demo's people; mail that is sent lies at /mail. Ctrl-C stops everything.\n",
      )
  } catch (error) {
    if (!(error instanceof SetUpError)) say(error.stack)
    else say(`\n${error.message}`)
    await stopAll(1)
  }
})
