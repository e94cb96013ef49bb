import type { CurveKey, DrawnSeries } from "../figure-kind"
import type { DescribedColumns } from "./described-columns"

type Values = readonly (number | null)[]

/** A reduced curve as it is drawn. */
export interface DrawnMean {
  readonly curve: CurveKey
  readonly trajectories: number
  readonly abscissa: readonly number[]
  readonly mean: readonly number[]
  readonly standardError: Values
  readonly bandLow?: Values | null
  readonly bandHigh?: Values | null
}

/** A fitted line as it is drawn. */
export interface DrawnLine {
  readonly grid: readonly number[]
  readonly line: readonly number[]
  readonly bandLow: readonly number[] | null
  readonly bandHigh: readonly number[] | null
  readonly outside: readonly boolean[]
}

/** Columns of the two axes of a panel. */
export function axisColumns({ abscissa, observable }: DescribedColumns) {
  return {
    x: (values: Values) => ({
      name: abscissa.name,
      unit: abscissa.unit,
      description: "abscissa",
      values,
    }),
    y: (name: string, description: string, values: Values) => ({
      name,
      unit: observable.normalised ? null : observable.unit,
      description,
      values,
    }),
  }
}

const bandColumns = (
  y: ReturnType<typeof axisColumns>["y"],
  low: Values | null | undefined,
  high: Values | null | undefined,
) =>
  low && high
    ? [y("band_low", "lower end of the band", low), y("band_high", "upper end of the band", high)]
    : []

/** Series "mean": the points of a curve with their errors. */
export function meanSeries(curve: DrawnMean, columns: DescribedColumns): DrawnSeries {
  const { x, y } = axisColumns(columns)
  return {
    name: "mean",
    curve: curve.curve,
    columns: [
      x(curve.abscissa),
      y("mean", curve.trajectories > 0 ? "mean over trajectories" : "value as given", curve.mean),
      y("standard_error", "standard error of the mean", curve.standardError),
      ...bandColumns(y, curve.bandLow, curve.bandHigh),
    ],
  }
}

/** Series "fit": a fitted line with its band. @param law what was fitted, in words */
export function fitSeries(
  curve: CurveKey,
  fit: DrawnLine,
  columns: DescribedColumns,
  law: string,
): DrawnSeries {
  const { x, y } = axisColumns(columns)
  return {
    name: "fit",
    curve,
    columns: [
      x(fit.grid),
      y("fit", `fitted ${law}; outside the window it is extrapolation`, fit.line),
      ...bandColumns(y, fit.bandLow, fit.bandHigh),
      {
        name: "outside_window",
        unit: null,
        description: "1 outside the fit window",
        values: fit.outside.map(Number),
      },
    ],
  }
}
