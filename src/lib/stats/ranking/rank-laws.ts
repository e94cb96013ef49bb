import { fitLaw, type LawFit } from "../laws/fit-law"
import type { Law, LawScale } from "../laws/law"
import type { ReplicatedMeans } from "../laws/replicated-means"
import type { StatisticalWarning } from "../warnings/statistical-warning"
import { warn } from "../warnings/warning-catalogue"
import { aiccEstimatedScale } from "./aicc"

export interface RankedLaw {
  readonly law: Law
  /** null where the law has no fit on the whole sample. */
  readonly fit: LawFit | null
  /** Share of the resamples in which this law has the smallest criterion. */
  readonly wins: number
}

export interface LawRanking {
  /** Most frequent winner first. */
  readonly laws: readonly RankedLaw[]
  /** Resamples in which at least one law could be fitted. */
  readonly resamples: number
  readonly warnings: readonly StatisticalWarning[]
}

/**
 * How often each law wins when whole trajectories are resampled and everything is refitted. The points of one ensemble are
 * correlated, so a criterion computed once overstates the evidence; its winner's frequency does not.
 *
 * @param means of `resampledMeans`
 * @param scale the same for all laws, or their sums of squares could not be compared
 * @see docs/methods.md, ranking of laws
 */
export function rankLaws(
  laws: readonly Law[],
  means: ReplicatedMeans,
  [low, high]: readonly [number | null, number | null],
  scale: LawScale,
  where: string,
): LawRanking {
  const firstPositive = means.abscissa.find((t) => t > 0) ?? 0
  const needsPositive = laws.some(({ positiveTimes }) => positiveTimes)
  const window = [needsPositive ? Math.max(low ?? 0, firstPositive) : low, high] as const
  const fits = laws.map((law) => {
    const fit = fitLaw(law, means, window, { scale })
    return "refused" in fit ? null : fit
  })
  const criterion = (fit: LawFit | null, replicate: number) => {
    const sum = fit?.replicateSums[replicate] ?? Number.NaN
    return Number.isNaN(sum) ? Infinity : aiccEstimatedScale(sum, fit!.parameters.length, fit!.to - fit!.from)
  }
  const wins = laws.map(() => 0)
  let resamples = 0
  for (let r = 0; r < means.replicates; r += 1) {
    const criteria = fits.map((fit) => criterion(fit, r))
    const best = Math.min(...criteria)
    if (best === Infinity) continue
    resamples += 1
    const winner = criteria.indexOf(best)
    wins[winner] = wins[winner]! + 1
  }
  const points = Math.min(...fits.flatMap((fit) => (fit ? [fit.to - fit.from] : [])))
  const most = Math.max(...laws.map(({ parameters }) => parameters.length))
  const unsafe = fits.includes(null) || points < 6 || points - most - 1 < 2
  return {
    laws: laws
      .map((law, k) => ({ law, fit: fits[k]!, wins: wins[k]! / resamples }))
      .sort((a, b) => b.wins - a.wins),
    resamples,
    warnings: unsafe ? [warn("MODEL_RANK_UNSAFE", where)] : [],
  }
}
