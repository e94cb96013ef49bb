import type { PreparedCurves } from "../ensemble/prepare-curves"
import type { FigureKind } from "../figure-kind"
import { build } from "./build"
import { computeDecay, fitDecay } from "./compute"
import { decayExponentParams, type DecayExponentParams } from "./params"
import { preparedFrom, prepareDecay } from "./prepare"
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
  live: {
    preparedFrom,
    prepare: prepareDecay,
    fit: (prepared, params) => fitDecay(prepared as PreparedCurves, params),
  },
} as const satisfies FigureKind<DecayExponentParams, DecayResult>
