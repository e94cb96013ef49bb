import type { Heat } from "@/components/parts/heat"
import type { FigureAnswer, FigureVersionInList } from "@/lib/contracts/figures"

export interface FigureState {
  readonly heat: Heat
  readonly words: string
}

/** How settled a figure version is, for its mark and its segment of the strip. */
export function versionState(version: FigureVersionInList, isNewest = true): FigureState {
  const { computation, locked, pinnedIn } = version
  if (locked) return { heat: "locked", words: "locked" }
  if (computation.state === "failed") return { heat: "work", words: "could not be made" }
  if (computation.state !== "done") return { heat: "work", words: "being computed" }
  if (pinnedIn.length > 0)
    return isNewest
      ? { heat: "settled", words: "pinned" }
      : { heat: "stale", words: "pinned, a newer version exists" }
  return { heat: "proposed", words: "saved, not pinned" }
}

/** How settled a figure is: what its draft pins, against what is newest. */
export function figureState(figure: FigureAnswer): FigureState {
  const newest = figure.versions[0]
  if (!newest) return { heat: "work", words: "no version yet" }
  const pinned = figure.versions.find((version) => version.pinnedIn.length > 0)
  return pinned && pinned !== newest ? versionState(pinned, false) : versionState(newest)
}
