import { randomBytes } from "node:crypto"
import pg from "pg"
import { migrate } from "@/lib/server/db/migrate"

const template = "afterquench_template"
/** Any number, the same for all test files: only one of them makes the template. */
const lockKey = 718_281

function baseUrls(): { owner: string; application: string } {
  const { TEST_DATABASE_OWNER_URL: owner, TEST_DATABASE_URL: application } = process.env
  if (!owner || !application)
    throw new Error(
      "These tests need PostgreSQL: run them with npm test, which starts one and names it in TEST_DATABASE_URL.",
    )
  return { owner, application }
}

function withDatabase(url: string, name: string): string {
  const changed = new URL(url)
  changed.pathname = `/${name}`
  return changed.href
}

async function asOwner<T>(act: (client: pg.Client) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: baseUrls().owner })
  await client.connect()
  try {
    return await act(client)
  } finally {
    await client.end()
  }
}

async function makeTemplate(client: pg.Client): Promise<void> {
  const { rowCount } = await client.query("select 1 from pg_database where datname = $1 and datistemplate", [
    template,
  ])
  if (rowCount) return
  await client.query(`drop database if exists ${template}`)
  await client.query(`create database ${template}`)
  await migrate(withDatabase(baseUrls().owner, template))
  await client.query(`alter database ${template} with is_template true`)
}

export interface FreshDatabase {
  readonly ownerUrl: string
  readonly appUrl: string
  readonly drop: () => Promise<void>
}

/** A database of its own for a test file, cloned from a migrated template. */
export async function freshDatabase(): Promise<FreshDatabase> {
  const name = `t_${process.pid}_${randomBytes(4).toString("hex")}`
  await asOwner(async (client) => {
    await client.query("select pg_advisory_lock($1)", [lockKey])
    await makeTemplate(client)
    await client.query(`create database ${name} template ${template}`)
  })
  return {
    ownerUrl: withDatabase(baseUrls().owner, name),
    appUrl: withDatabase(baseUrls().application, name),
    drop: () => asOwner(async (client) => void (await client.query(`drop database ${name} with (force)`))),
  }
}
