import pg from "pg"

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
  const report = (error: Error) => console.error(`database connection lost: ${error.message}`)
  pool.on("error", report)
  pool.on("connect", (client) => client.on("error", report))
  return pool
}
