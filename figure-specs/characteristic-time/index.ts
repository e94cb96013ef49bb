import type { FigureKind } from "../figure-kind"
import { build } from "./build"
import { computeTimes } from "./compute"
import { characteristicTimeParams, type CharacteristicTimeParams } from "./params"
import { proposeTimes } from "./propose"
import type { CharacteristicTimeResult } from "./result"
import { timeSentence } from "./sentence"

export const characteristicTime = {
  kind: "characteristic-time",
  title: "Characteristic time",
  description:
    "A breakdown, relaxation or first-passage time against a control parameter: power law, exponential and activated law, ranked.",
  params: characteristicTimeParams,
  propose: proposeTimes,
  compute: computeTimes,
  build,
  sentence: timeSentence,
} as const satisfies FigureKind<CharacteristicTimeParams, CharacteristicTimeResult>
