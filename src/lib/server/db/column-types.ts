import type { ColumnType } from "kysely"

/**
 * A jsonb column: written as text, because the driver would turn an array into a PostgreSQL array; read as unknown,
 * because stored JSON is checked where it is used.
 */
export type JsonColumn = ColumnType<unknown, string, string>

/** A column with a default whose values are narrower than its SQL type says. */
export type Defaulted<T> = ColumnType<T, T | undefined, T>
