import { runMigrations } from "graphile-worker"
import { Kysely, Migrator, PostgresDialect } from "kysely"
import { migrations } from "../../../../migrations"
import { createPool } from "./create-pool"
import { grantRights } from "./rights"

/**
 * Brings a database to the present schema: our migrations, the job queue's, then the application role's rights. Safe to
 * repeat, and for two processes at once (the migrator holds a lock).
 *
 * @param ownerUrl connection string of the role that owns the database
 * @returns names of the migrations that ran
 * @throws Error of the first migration that failed; that one is rolled back
 */
export async function migrate(ownerUrl: string): Promise<readonly string[]> {
  const pool = createPool(ownerUrl, 4)
  const db = new Kysely<unknown>({ dialect: new PostgresDialect({ pool }) })
  try {
    const migrator = new Migrator({ db, provider: { getMigrations: async () => migrations } })
    const { error, results = [] } = await migrator.migrateToLatest()
    if (error !== undefined) {
      const failed = results.find((result) => result.status === "Error")
      throw new Error(`migration ${failed?.migrationName ?? ""} failed: ${String(error)}`, { cause: error })
    }
    await runMigrations({ pgPool: pool })
    await db.transaction().execute(grantRights)
    return results.map((result) => result.migrationName)
  } finally {
    await db.destroy()
  }
}

// By the program's name, not its URL: bundled into another program this module must not run by itself.
if (/[\\/]migrate\.m?[jt]s$/.test(process.argv[1] ?? "")) {
  const url = process.env.DATABASE_OWNER_URL ?? process.env.DATABASE_URL
  if (url === undefined)
    throw new Error("Set DATABASE_OWNER_URL to the address of the database as its owner.")
  const ran = await migrate(url)
  console.log(ran.length === 0 ? "The database is up to date." : `Migrated: ${ran.join(", ")}.`)
}
