import { Button } from "./button"

/** Long work with true counts: what is being done, how far it is, and the way to stop it. */
export function ProgressLine({
  what,
  done,
  total,
  unit,
  onCancel,
}: {
  /** "Reading rows", "Drawing resamples". */
  what: string
  done?: number | undefined
  total?: number | undefined
  unit?: string | undefined
  onCancel?: (() => void) | undefined
}) {
  const known = done !== undefined && total !== undefined && total > 0
  const share = known ? Math.min(1, done / total) : undefined
  const count = (n: number) => n.toLocaleString("en").replaceAll(",", "\u202f")
  return (
    <div role="status" className="grid max-w-md gap-1 text-small text-work-ink">
      <div className="flex items-baseline justify-between gap-4">
        <span>
          {what}
          {known && (
            <span className="tabular-nums">
              : {count(done)} of {count(total)} {unit}
            </span>
          )}
          {!known && "…"}
        </span>
        {onCancel && (
          <Button look="quiet" onPress={onCancel}>
            Stop
          </Button>
        )}
      </div>
      <progress className="visually-hidden" value={share} max={1} aria-label={what} />
      <div aria-hidden="true" className="h-0.5 bg-hairline">
        <div className="h-full bg-work" style={{ width: share === undefined ? "25%" : `${share * 100}%` }} />
      </div>
    </div>
  )
}
