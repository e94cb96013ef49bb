import type { PanelResult } from "@specs/figure-kind"
import type { FigureSpec } from "@specs/figure-spec"
import type { PanelParams } from "@specs/registry"
import type { SpecIssue } from "@specs/spec-error"

/** Accepted dataset versions that the editor works with, by dataset name. */
export type DatasetPins = Readonly<Record<string, number>>

export type AnalysisRequest =
  | {
      readonly type: "compute"
      readonly id: number
      readonly manuscriptId: string
      readonly spec: FigureSpec
      readonly pins: DatasetPins
    }
  | {
      readonly type: "propose"
      readonly id: number
      readonly manuscriptId: string
      readonly kind: PanelParams["kind"]
      readonly dataset: string
      readonly number: number
      readonly roles: Readonly<Record<string, string>>
    }

export type AnalysisAnswer =
  | {
      readonly type: "results"
      readonly id: number
      readonly panels: readonly PanelResult[]
      readonly ms: number
    }
  | { readonly type: "proposal"; readonly id: number; readonly panel: PanelParams }
  | { readonly type: "issues"; readonly id: number; readonly issues: readonly SpecIssue[] }
  | { readonly type: "progress"; readonly id: number; readonly what: string; readonly share: number }
