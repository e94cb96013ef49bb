import { useState } from "react"
import { Button } from "@/components/parts/button"

export type Theme = "light" | "dark"

/** One of two papers; remembered in a cookie so that the server can answer in the right one. */
export function ThemeSwitch({ initial }: { initial: Theme | null }) {
  const [theme, setTheme] = useState<Theme | null>(initial)
  const flip = () => {
    const shown = theme ?? (matchMedia("(prefers-color-scheme: dark)").matches ? "dark" : "light")
    const next: Theme = shown === "dark" ? "light" : "dark"
    document.documentElement.dataset.theme = next
    document.cookie = `theme=${next}; path=/; max-age=31536000; samesite=lax`
    setTheme(next)
  }
  return (
    <Button look="quiet" onPress={flip} aria-label="Switch between light and dark paper">
      {theme === "dark" ? "Light paper" : theme === "light" ? "Dark paper" : "Other paper"}
    </Button>
  )
}
