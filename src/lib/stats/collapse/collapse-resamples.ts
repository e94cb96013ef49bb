import type { Ensemble } from "../ensemble/ensemble"
import { resampledMeans } from "../laws/replicated-means"
import { fitCollapse, refitCollapse, type CollapseConstraint, type CollapseFit } from "./fit-collapse"
import { sizeCurve, type CollapseExponents, type SizeCurve } from "./size-curve"

/** The ensemble of one system size. */
export interface SizeEnsemble {
  readonly size: number
  readonly ensemble: Ensemble
}

export interface ResampledCollapse {
  readonly fit: CollapseFit
  /** The curves of the whole sample, by size as given. */
  readonly curves: readonly SizeCurve[]
  /** Over resamples of whole trajectories within each size, jointly; NaN where the refit failed. */
  readonly a: Float64Array
  readonly z: Float64Array
}

/**
 * Collapse of ensemble means with its joint resamples: trajectories are redrawn within each size, means and errors taken
 * anew, exponents refitted from the optimum. Relations such as beta = a/z or a + z = 2 are tested on these pairs.
 *
 * @param window of t, the same rule for every size
 * @param seed of the first size; the others follow it, so that sizes are redrawn independently
 * @returns why there is none: a mean that is not positive, or curves that do not overlap at the guess
 * @see docs/methods.md, scaling collapse
 */
export function resampleCollapse(
  sizes: readonly SizeEnsemble[],
  window: readonly [number | null, number | null],
  guess: CollapseExponents,
  constraint: CollapseConstraint,
  { resamples, seed }: { readonly resamples: number; readonly seed: number },
): ResampledCollapse | { readonly refused: "NONPOSITIVE_MEANS" | "NO_OVERLAP" } {
  const means = sizes.map(({ ensemble }, s) => resampledMeans(ensemble, { resamples, seed: seed + s }))
  const row = (r: number) =>
    means.map(({ abscissa, mean, variance }, s) => {
      const at = r * abscissa.length
      const sigma = variance.subarray(at, at + abscissa.length).map(Math.sqrt)
      return sizeCurve(sizes[s]!.size, abscissa, mean.subarray(at, at + abscissa.length), sigma, window)
    })
  const complete = (curves: readonly (SizeCurve | null)[]): curves is SizeCurve[] => !curves.includes(null)
  const curves = row(0)
  if (!complete(curves)) return { refused: "NONPOSITIVE_MEANS" }
  const fit = fitCollapse(curves, guess, constraint)
  if (!fit) return { refused: "NO_OVERLAP" }
  const a = new Float64Array(resamples).fill(Number.NaN)
  const z = new Float64Array(resamples).fill(Number.NaN)
  for (let r = 0; r < resamples; r += 1) {
    const again = row(r + 1)
    if (!complete(again)) continue
    const exponents = refitCollapse(again, fit)
    a[r] = exponents.a
    z[r] = exponents.z
  }
  return { fit, curves, a, z }
}
