import type { FigureKind } from "../figure-kind"
import { build } from "./build"
import { fitDivergence, preparedFrom, prepareDivergence, type PreparedDivergence } from "./compute"
import { finiteTimeDivergenceParams, type FiniteTimeDivergenceParams } from "./params"
import { proposeDivergence } from "./propose"
import type { DivergenceResult } from "./result"
import { divergenceSentence } from "./sentence"

export const finiteTimeDivergence = {
  kind: "finite-time-divergence",
  title: "Finite-time divergence",
  description:
    "Growth towards a singular time, A (t* - t)^-g, with the time and its exponent fitted together.",
  params: finiteTimeDivergenceParams,
  propose: proposeDivergence,
  compute: (input, params) => fitDivergence(prepareDivergence(input, params), params),
  build,
  sentence: divergenceSentence,
  live: {
    preparedFrom,
    prepare: prepareDivergence,
    fit: (prepared, params) => fitDivergence(prepared as PreparedDivergence, params),
  },
} as const satisfies FigureKind<FiniteTimeDivergenceParams, DivergenceResult>
