/** The states that rows pass through; the same words in SQL checks, in the API and in the interface. */
export const datasetVersionStates = [
  "uploaded",
  "reading",
  "proposed",
  "accepted",
  "refused",
  "failed",
] as const
export type DatasetVersionState = (typeof datasetVersionStates)[number]

export const computationStates = ["queued", "computing", "done", "failed", "cancelled"] as const
export type ComputationState = (typeof computationStates)[number]

export const draftStates = ["open", "locked"] as const
export type DraftState = (typeof draftStates)[number]

export const bundleStates = ["queued", "building", "done", "failed"] as const
export type BundleState = (typeof bundleStates)[number]

export const renderingFormats = ["svg", "png", "pdf", "eps", "tiff"] as const
export type RenderingFormat = (typeof renderingFormats)[number]

/** When mail about a manuscript is sent: at once, once a day, or never. */
export const mailPreferences = ["each", "digest", "none"] as const
export type MailPreference = (typeof mailPreferences)[number]
