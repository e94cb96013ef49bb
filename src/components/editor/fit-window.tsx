import { useId, useRef } from "react"
import { nearestIndex, shiftedEdge } from "./window-steps"

export interface WindowScale {
  /** Pixels from the left edge of the chart's box for an abscissa. */
  readonly toPx: (value: number) => number
  /** The inverse of `toPx`. */
  readonly fromPx: (px: number) => number
  readonly left: number
  readonly top: number
  readonly width: number
  readonly height: number
}

/**
 * Two handles over the working view. What lies outside the window is tinted, not what lies inside. Arrow keys move an
 * edge by one grid point, with Shift by a tenth of a decade, Home and End to the ends of the data.
 */
export function FitWindow({
  scale,
  grid,
  window,
  symbol,
  unit,
  onChange,
}: {
  scale: WindowScale
  /** Abscissas of the points that can be fitted, increasing. */
  grid: readonly number[]
  window: readonly [number | null, number | null]
  symbol: string
  unit: string | null
  /** `gesture` is the same for all moves of one drag, so that one undo takes back the drag. */
  onChange: (window: [number, number], gesture: string) => void
}) {
  const id = useId()
  const gesture = useRef(0)
  const dragging = useRef<"low" | "high" | null>(null)
  const box = useRef<HTMLDivElement>(null)
  const first = grid[0] ?? 0
  const last = grid.at(-1) ?? 1
  const low = Math.max(window[0] ?? first, first)
  const high = Math.min(window[1] ?? last, last)
  const lowPx = scale.toPx(low)
  const highPx = scale.toPx(high)

  const move = (edge: "low" | "high", value: number) => {
    const lowIndex = nearestIndex(grid, low)
    const highIndex = nearestIndex(grid, high)
    const index = nearestIndex(grid, value)
    if (edge === "low")
      onChange([grid[Math.min(index, highIndex - 2)] ?? low, high], `drag-${gesture.current}`)
    else onChange([low, grid[Math.max(index, lowIndex + 2)] ?? high], `drag-${gesture.current}`)
  }

  const handle = (edge: "low" | "high") => {
    const value = edge === "low" ? low : high
    const px = edge === "low" ? lowPx : highPx
    const word = edge === "low" ? "from" : "to"
    return (
      <div
        key={edge}
        role="slider"
        tabIndex={0}
        aria-label={edge === "low" ? "Start of the fit window" : "End of the fit window"}
        aria-orientation="horizontal"
        aria-valuemin={first}
        aria-valuemax={last}
        aria-valuenow={value}
        aria-valuetext={`${word} ${symbol} = ${Number(value.toPrecision(4))}${unit ? ` ${unit}` : ""}`}
        aria-describedby={`${id}-keys`}
        className="group absolute z-10 w-6 -translate-x-1/2 cursor-ew-resize touch-none outline-none"
        style={{ left: px, top: scale.top, height: scale.height }}
        onPointerDown={(event) => {
          event.preventDefault()
          event.currentTarget.focus()
          event.currentTarget.setPointerCapture(event.pointerId)
          gesture.current += 1
          dragging.current = edge
        }}
        onPointerMove={(event) => {
          const bounds = box.current?.getBoundingClientRect()
          if (dragging.current === edge && bounds) move(edge, scale.fromPx(event.clientX - bounds.left))
        }}
        onPointerUp={() => {
          dragging.current = null
        }}
        onKeyDown={(event) => {
          const next = shiftedEdge(grid, value, event.key, event.shiftKey)
          if (next === null) return
          event.preventDefault()
          gesture.current += 1
          move(edge, next)
        }}
      >
        <span className="absolute inset-y-0 left-1/2 w-px -translate-x-1/2 bg-plate-ink group-focus-visible:w-[3px]" />
        <span
          className={`absolute top-1/2 left-1/2 h-7 w-3 -translate-1/2 border border-plate-ink bg-plate group-focus-visible:border-2 ${
            edge === "low" ? "rounded-l-full" : "rounded-r-full"
          }`}
        />
      </div>
    )
  }

  return (
    <div ref={box} className="absolute inset-0">
      <div aria-hidden="true" className="pointer-events-none absolute inset-0">
        <div
          className="absolute bg-plate-ink/8"
          style={{
            left: scale.left,
            top: scale.top,
            width: Math.max(0, lowPx - scale.left),
            height: scale.height,
          }}
        />
        <div
          className="absolute bg-plate-ink/8"
          style={{
            left: highPx,
            top: scale.top,
            width: Math.max(0, scale.left + scale.width - highPx),
            height: scale.height,
          }}
        />
      </div>
      {(["low", "high"] as const).map(handle)}
      <p id={`${id}-keys`} hidden>
        Arrow keys move by one point, with Shift by a tenth of a decade, Home and End to the ends of the data.
      </p>
    </div>
  )
}
