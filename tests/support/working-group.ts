import { createDb, type Db } from "@/lib/server/db/client"
import { createPool } from "@/lib/server/db/create-pool"
import type { Role } from "@/lib/domain/policy"
import { withToken } from "./callers"
import { decayCsv, decaySpec } from "./decay-table"
import { insertPerson } from "./one-of-everything"
import { type Answered, send } from "./send"
import { type RunningApp, startApp } from "./start-app"
import { until } from "./until"

type Body = Record<string, unknown>

/** Somebody who calls the API with a token of scope all. */
export interface Caller {
  readonly personId: string
  readonly headers: Record<string, string>
  readonly call: (method: string, address: string, body?: unknown, headers?: object) => Promise<Answered>
  /** As `call`, below the manuscript; throws with the answer when it is no success. */
  readonly act: (method: string, address: string, body?: unknown, headers?: object) => Promise<Body>
  readonly upload: (dataset: string, content: string | Uint8Array, headers?: object) => Promise<Response>
}

/** The running application with a group of three, one manuscript, and a worker. */
export interface WorkingGroup {
  readonly app: RunningApp
  readonly db: Db
  readonly manuscriptId: string
  readonly people: Record<Role, Caller>
  readonly stop: () => Promise<void>
}

async function caller(app: RunningApp, db: Db, name: string, manuscript: () => string): Promise<Caller> {
  const personId = await insertPerson(db, name)
  const { headers } = await withToken(db, personId, "all")
  const call: Caller["call"] = (method, address, body, more) =>
    send(app.url, method, `/api/v1${address}`, { body, headers: { ...headers, ...more } })
  return {
    personId,
    headers,
    call,
    act: async (method, address, body, more) => {
      const answer = await call(method, `/manuscripts/${manuscript()}${address}`, body, more)
      if (answer.status >= 300)
        throw new Error(`${method} ${address}: ${answer.status} ${JSON.stringify(answer.body)}`)
      return answer.body
    },
    upload: (dataset, content, more) =>
      fetch(`${app.url}/api/v1/manuscripts/${manuscript()}/datasets/${dataset}/versions`, {
        method: "PUT",
        body: content as BodyInit,
        headers: { ...headers, ...more },
      }),
  }
}

export async function startGroup(
  parts: { worker?: boolean; mail?: boolean } = { worker: true },
): Promise<WorkingGroup> {
  const app = await startApp({}, parts)
  const db = createDb(createPool(app.database.appUrl, 4))
  let manuscriptId = ""
  const person = (name: string) => caller(app, db, name, () => manuscriptId)
  const people = {
    "corresponding-author": await person("Ilse Brandvold"),
    "co-author": await person("Teo Marchetti"),
    reader: await person("Noor Haddad"),
  }
  const made = await people["corresponding-author"].call("POST", "/manuscripts", { title: "Slow decay" })
  manuscriptId = String(made.body.id)
  for (const role of ["co-author", "reader"] as const)
    await db
      .insertInto("membership")
      .values({ manuscriptId, personId: people[role].personId, role })
      .execute()
  const stop = async () => {
    await db.destroy()
    await app.stop()
  }
  return { app, db, manuscriptId, people, stop }
}

/** Uploads a table and accepts it once it is read. @returns the number of the version */
export async function acceptedDataset(by: Caller, dataset = "runs", csv = decayCsv()): Promise<number> {
  const { number } = (await (await by.upload(dataset, csv)).json()) as { number: number }
  const address = `/datasets/${dataset}/versions/${number}`
  await until(`reading ${dataset}`, async () => (await by.act("GET", address)).state === "proposed")
  await by.act("POST", `${address}/accept`, {})
  return number
}

/** Makes a figure with one version and waits for its proof. @returns the figure's id */
export async function computedFigure(
  by: Caller,
  name = "decay",
  spec: object = decaySpec(),
): Promise<string> {
  const figure = await by.act("POST", "/figures", { name, title: "Decay", caption: "Decay of $n(t)$." })
  await computedVersion(by, String(figure.id), spec)
  return String(figure.id)
}

/** Saves a version of a figure and waits for its proof. @returns the version */
export async function computedVersion(by: Caller, figureId: string, spec: object): Promise<Body> {
  const { number } = await by.act("POST", `/figures/${figureId}/versions`, { spec, message: "Saved." })
  return until(`computing version ${String(number)}`, async () => {
    const version = await by.act("GET", `/figures/${figureId}/versions/${String(number)}`)
    const { state, failure } = version.computation as { state: string; failure: unknown }
    if (state === "failed") throw new Error(`It could not be computed: ${JSON.stringify(failure)}`)
    return state === "done" && version
  })
}
