import type { CurveResult } from "../figure-kind"
import type { DataBinding } from "../schema/data-binding"
import type { ReductionParams } from "../schema/panel-parts"

/** "of 200 trajectories", "of 64 to 120 trajectories"; empty for values with given errors. */
export function trajectoryCount(counts: readonly number[]): string {
  const [least, most] = [Math.min(...counts), Math.max(...counts)]
  if (counts.length === 0 || most === 0) return ""
  return ` of ${least === most ? most : `${least} to ${most}`} trajectories`
}

/** "Points: mean of 200 trajectories (bars: one standard error of the mean, 8 logarithmic bins per decade)." */
export function pointsSentence(
  data: DataBinding,
  reduction: ReductionParams,
  counts: readonly number[],
): string {
  const bars =
    reduction.uncertainty === "none"
      ? "without error bars"
      : data.columns.trajectory
        ? "bars: one standard error of the mean"
        : data.columns.uncertainty
          ? "bars: standard errors as given"
          : "without error bars"
  const binned = reduction.bins ? `, ${reduction.bins.perDecade} logarithmic bins per decade` : ""
  const what = data.columns.trajectory ? `mean${trajectoryCount(counts)}` : "values"
  return `Points: ${what} (${bars}${binned}).`
}

/** "Exponents, one standard error in brackets: −0.50(2) (gamma = 0.5), −0.48(3) (gamma = 1)." */
export function quantitySentence(
  name: string,
  word: string,
  curves: readonly CurveResult[],
  curveBy: string | null,
): readonly string[] {
  const texts = curves.flatMap(({ curve, quantities }) => {
    const quantity = quantities.find((candidate) => candidate.name === name)
    return quantity ? [`${quantity.text}${curve === null ? "" : ` (${curveBy} = ${curve})`}`] : []
  })
  if (texts.length === 0) return []
  return [`${word}${texts.length > 1 ? "s" : ""}, one standard error in brackets: ${texts.join(", ")}.`]
}
