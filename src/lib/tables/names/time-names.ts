/** Names under which a time is looked for, best first. */
export const timeNames = ["t", "time", "tau", "τ", "step", "zeit", "temps"]

/** Place of a name in {@link timeNames}, by its first word; -1 when it names no time. */
export const timeRank = (name: string): number =>
  timeNames.indexOf(name.trim().toLowerCase().split(/\s+/)[0]!)

export const isTimeName = (name: string): boolean => timeRank(name) >= 0
