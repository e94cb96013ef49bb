import { CamelCasePlugin, Kysely, PostgresDialect } from "kysely"
import type pg from "pg"
import { env } from "@/lib/server/env"
import { createPool } from "./create-pool"
import type { DB } from "./types"

export type Db = Kysely<DB>

/** Kysely over a pool; snake_case in SQL, camelCase here. JSON inside columns keeps its keys. */
export function createDb(pool: pg.Pool): Db {
  return new Kysely<DB>({
    dialect: new PostgresDialect({ pool }),
    plugins: [new CamelCasePlugin({ maintainNestedObjectKeys: true })],
  })
}

let pool: pg.Pool | undefined
let db: Db | undefined

/** The process's pool under the application role; for COPY and LISTEN, which Kysely does not speak. */
export function getPool(): pg.Pool {
  pool ??= createPool(env().DATABASE_URL)
  return pool
}

/** The process's database under the application role. */
export function getDb(): Db {
  db ??= createDb(getPool())
  return db
}

/** Ends the process's pool, if there is one. */
export async function closeDb(): Promise<void> {
  const closing = pool
  pool = undefined
  db = undefined
  await closing?.end()
}
