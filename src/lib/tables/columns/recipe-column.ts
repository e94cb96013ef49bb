import type { RecipeColumn } from "../reading-recipe"
import type { ColumnReading } from "../table-reading"

/** What a recipe says of a column that was read: what was told, and what was found out. */
export function recipeColumn(column: ColumnReading, told: Partial<RecipeColumn> | undefined): RecipeColumn {
  const { name, unit, symbol, role, kind, axes } = column
  const named = axes?.every((axis) => axis.name !== null) ?? false
  return {
    name,
    unit,
    symbol,
    role,
    kind,
    thousands: told?.thousands ?? null,
    sentinels: told?.sentinels ?? null,
    axes: named ? axes!.map((axis) => axis.name!) : null,
  }
}
