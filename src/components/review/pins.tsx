interface Pin {
  readonly id: string
  readonly x: number
  readonly y: number
  readonly isOpen: boolean
}
interface Point {
  readonly x: number
  readonly y: number
}

/** Where the disc of a pin stands: outside the artwork, at its nearer side, at the height of its place. */
const side = (pin: Point) => (pin.x < 50 ? "left" : "right")

const discClass = "grid size-6 place-items-center rounded-full border text-fine font-semibold tabular-nums"

/**
 * Numbered discs outside the artwork, joined by a hairline to their places. While a place is being chosen the plate takes
 * clicks, and arrow keys move the mark by one per cent.
 */
export function Pins({
  pins,
  proposed,
  onPlace,
}: {
  pins: readonly Pin[]
  proposed: Point | null
  onPlace: ((place: Point) => void) | null
}) {
  return (
    <>
      <svg
        aria-hidden="true"
        viewBox="0 0 100 100"
        preserveAspectRatio="none"
        className="pointer-events-none absolute inset-0 size-full overflow-visible"
      >
        {pins.map((pin) => (
          <line
            key={pin.id}
            x1={side(pin) === "left" ? 0 : 100}
            x2={pin.x}
            y1={pin.y}
            y2={pin.y}
            className={pin.isOpen ? "stroke-work" : "stroke-settled"}
            strokeWidth="1"
            vectorEffect="non-scaling-stroke"
          />
        ))}
      </svg>
      {pins.map((pin, index) => (
        <a
          key={pin.id}
          href={`#thread-${pin.id}`}
          aria-label={`Thread ${index + 1}, ${pin.isOpen ? "open" : "resolved"}`}
          style={{ top: `${pin.y}%` }}
          className={`absolute -translate-y-1/2 no-underline ${side(pin) === "left" ? "right-full mr-0.5" : "left-full ml-0.5"}`}
        >
          <span
            className={`${discClass} bg-paper ${pin.isOpen ? "border-work text-work-ink" : "border-settled text-settled-ink"}`}
          >
            {index + 1}
          </span>
        </a>
      ))}
      {onPlace && (
        <button
          type="button"
          aria-label={`The place that the thread speaks of: ${Math.round(proposed?.x ?? 50)} % from the left, ${Math.round(proposed?.y ?? 50)} % from the top. Arrow keys move it.`}
          className="absolute inset-0 cursor-crosshair bg-transparent"
          onClick={(event) => {
            // A click by keyboard has no position; the arrow keys are its way.
            if (event.detail === 0) return
            const box = event.currentTarget.getBoundingClientRect()
            onPlace({
              x: Math.min(100, Math.max(0, ((event.clientX - box.left) / box.width) * 100)),
              y: Math.min(100, Math.max(0, ((event.clientY - box.top) / box.height) * 100)),
            })
          }}
          onKeyDown={(event) => {
            const step = { ArrowLeft: [-1, 0], ArrowRight: [1, 0], ArrowUp: [0, -1], ArrowDown: [0, 1] }[
              event.key
            ]
            if (!step) return
            event.preventDefault()
            const at = proposed ?? { x: 50, y: 50 }
            const within = (value: number) => Math.min(100, Math.max(0, value))
            onPlace({ x: within(at.x + step[0]!), y: within(at.y + step[1]!) })
          }}
        >
          {proposed && (
            <span
              className="absolute size-4 -translate-1/2 rounded-full border-2 border-work"
              style={{ left: `${proposed.x}%`, top: `${proposed.y}%` }}
            />
          )}
        </button>
      )}
    </>
  )
}
