import type { FigureKind } from "../figure-kind"
import { build } from "./build"
import { computeTrace } from "./compute"
import { ensembleTraceParams, type EnsembleTraceParams } from "./params"
import { proposeTrace } from "./propose"
import type { TraceResult } from "./result"
import { traceSentence } from "./sentence"

export const ensembleTrace = {
  kind: "ensemble-trace",
  title: "Ensemble trace",
  description: "Any ensemble-averaged observable against time with its band, and the value it saturates to.",
  params: ensembleTraceParams,
  propose: proposeTrace,
  compute: computeTrace,
  build,
  sentence: traceSentence,
} as const satisfies FigureKind<EnsembleTraceParams, TraceResult>
