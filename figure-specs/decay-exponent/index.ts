import type { FigureKind } from "../figure-kind"
import { build } from "./build"
import { computeDecay } from "./compute"
import { decayExponentParams, type DecayExponentParams } from "./params"
import { proposeDecay } from "./propose"
import type { DecayResult } from "./result"
import { decaySentence } from "./sentence"

export const decayExponent = {
  kind: "decay-exponent",
  title: "Decay exponent",
  description:
    "Ensemble mean against time on log–log axes, with a fitted power law, its interval and its band.",
  params: decayExponentParams,
  propose: proposeDecay,
  compute: computeDecay,
  build,
  sentence: decaySentence,
} as const satisfies FigureKind<DecayExponentParams, DecayResult>
