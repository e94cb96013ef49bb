import type { BoundData } from "../bind-columns"
import type { TableColumn } from "../figure-kind"

/** A column as axes and legends name it. */
export interface DescribedColumn {
  readonly name: string
  readonly unit: string | null
  readonly symbol: string | null
}

/** What a panel of curves shows, as its titles say it. */
export interface DescribedColumns {
  readonly abscissa: DescribedColumn
  readonly observable: DescribedColumn & { readonly normalised: boolean }
  readonly curveBy: DescribedColumn | null
}

const described = ({ name, unit, symbol }: TableColumn): DescribedColumn => ({ name, unit, symbol })

/** The columns behind the axes of a panel. */
export function describeColumns(
  { columns, curveBy }: BoundData,
  normalised: boolean,
  axis: "time" | "coordinate" | "parameter" = "time",
): DescribedColumns {
  return {
    abscissa: described(columns.get(axis)!),
    observable: { ...described(columns.get("observable")!), normalised },
    curveBy: curveBy && described(curveBy),
  }
}
