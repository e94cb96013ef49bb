import arimo from "@expo-google-fonts/arimo/400Regular/Arimo_400Regular.ttf?url"
import stixTwoText from "@expo-google-fonts/stix-two-text/400Regular/STIXTwoText_400Regular.ttf?url"
import { useEffect, useState } from "react"
import type { FontFamily } from "@specs/chart/drawing"

const files: Record<FontFamily, string> = { Arimo: arimo, "STIX Two Text": stixTwoText }
const loading = new Map<FontFamily, Promise<void>>()

/** Makes a face of the figures known to this page; resolves once text in it can be measured. */
function loadFigureFont(family: FontFamily): Promise<void> {
  let known = loading.get(family)
  if (!known) {
    const face = new FontFace(family, `url(${files[family]})`)
    known = face.load().then((loaded) => void document.fonts.add(loaded))
    loading.set(family, known)
  }
  return known
}

/** Whether text of a face can be measured yet. A face that cannot be loaded is done without, in the page's own sans. */
export function useFigureFont(family: FontFamily): boolean {
  const [loaded, setLoaded] = useState<FontFamily | null>(null)
  useEffect(() => {
    let current = true
    loadFigureFont(family)
      .catch((error: unknown) => console.warn("The figure font could not be loaded:", error))
      .finally(() => current && setLoaded(family))
    return () => {
      current = false
    }
  }, [family])
  return loaded === family
}
