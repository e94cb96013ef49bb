import type { SentencePart, SlotControl } from "../figure-kind"

export const words = (text: string): SentencePart => ({ type: "words", text })

/** A slot that edits the place in the panel that `pointer` names. */
export const slot = (
  pointer: string,
  text: string,
  accepts: string,
  control: SlotControl,
  whenEmpty?: Extract<SentencePart, { type: "slot" }>["whenEmpty"],
): SentencePart => ({
  type: "slot",
  id: pointer,
  pointer,
  text,
  accepts,
  control,
  ...(whenEmpty ? { whenEmpty } : {}),
})

/** A choice between values that are written differently from what they mean. */
export const choice = (options: readonly (readonly [value: string, label: string])[]): SlotControl => ({
  type: "choice",
  options: options.map(([value, label]) => ({ value, label })),
})

export const columnControl = (role: string, optional = false): SlotControl => ({
  type: "column",
  role,
  optional,
})

/** A number for reading: four digits. */
export const numberText = (value: number): string => String(Number(value.toPrecision(4)))

export const percentText = (level: number): string => `${Number((level * 100).toPrecision(4))} %`

/** Hyphens before digits as the minus sign of typography. */
export const withMinusSigns = (text: string): string => text.replace(/(^|[ (–,])-(\d)/g, "$1−$2")
