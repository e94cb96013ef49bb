import { CamelCasePlugin, Kysely, PostgresDialect, type Transaction } from "kysely"
import pg from "pg"
import { env } from "@/lib/server/env"
import type { DB } from "./types"

export type Db = Kysely<DB>
export type Trx = Transaction<DB>

/**
 * bigint arrives as number: event ids, byte counts and count(*) stay far below 2^53, and a value that does not is an
 * error rather than a rounded number.
 */
function parseBigint(text: string): number {
  const value = Number(text)
  if (!Number.isSafeInteger(value)) throw new RangeError(`${text} from the database is beyond 2^53`)
  return value
}

const parsers: pg.CustomTypesConfig = {
  getTypeParser: ((oid: number, format?: "text" | "binary") =>
    oid === pg.types.builtins.INT8
      ? parseBigint
      : pg.types.getTypeParser(oid, format as "text")) as pg.CustomTypesConfig["getTypeParser"],
}

/** A pool that survives dropped connections: without the handler one would end the process. */
export function createPool(url: string, max = 10): pg.Pool {
  const pool = new pg.Pool({ connectionString: url, max, types: parsers })
  pool.on("error", (error) => console.error(`database connection lost: ${error.message}`))
  return pool
}

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
