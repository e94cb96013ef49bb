import { isPlainName } from "../names/column-names"
import { texSymbol } from "../names/tex-symbol"
import type { ColumnDescription } from "../table-reading"
import type { OutputColumn } from "./output-column"

/** What a sink learns of the columns before their values. */
export const describeColumns = (outputs: readonly OutputColumn[]): ColumnDescription[] =>
  outputs.map(({ name, unit, symbol, kind, axes, told }, index) => ({
    index,
    name,
    unit,
    symbol: told?.symbol ?? symbol ?? (isPlainName(name) && kind !== "text" ? texSymbol(name) : null),
    kind,
    axes,
  }))
