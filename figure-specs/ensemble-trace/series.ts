import type { DescribedColumns } from "../curve-panel/described-columns"
import type { DrawnSeries } from "../figure-kind"
import type { TraceCurve } from "./result"

/** The drawn numbers of one curve. */
export function traceSeries(curve: TraceCurve, { abscissa, observable }: DescribedColumns): DrawnSeries {
  const y = (name: string, description: string, values: readonly (number | null)[]) => ({
    name,
    unit: observable.normalised ? null : observable.unit,
    description,
    values,
  })
  return {
    name: "mean",
    curve: curve.curve,
    columns: [
      { name: abscissa.name, unit: abscissa.unit, description: "abscissa", values: curve.abscissa },
      y("mean", curve.trajectories > 0 ? "mean over trajectories" : "value as given", curve.mean),
      y("standard_error", "standard error of the mean", curve.standardError),
      ...(curve.bandLow && curve.bandHigh
        ? [
            y("band_low", "lower end of the band", curve.bandLow),
            y("band_high", "upper end of the band", curve.bandHigh),
          ]
        : []),
    ],
  }
}
