import { useCallback, useMemo, useRef, useState, useLayoutEffect } from "react"
import { ProgressLine } from "@/components/parts/progress-line"
import { WorkingChart, type ChartPlace } from "@/components/working-view/vega-canvas"
import { typesetAll } from "@/lib/client/typeset"
import type { Analysis } from "@/lib/client/use-analysis"
import { defaultLook, scaleLook } from "@specs/chart/look"
import type { Frame } from "@specs/figure-kind"
import type { FigureSpec } from "@specs/figure-spec"
import { kindOf } from "@specs/kinds"
import { FitWindow } from "./fit-window"

const pixelsPerMm = 96 / 25.4

/** The living plot of one panel, with the handles of its fit window. */
export function WorkingView({
  analysis,
  index,
  spec,
  onWindow,
}: {
  analysis: Analysis
  index: number
  spec: FigureSpec
  onWindow: (window: [number, number], gesture: string) => void
}) {
  const box = useRef<HTMLDivElement>(null)
  const [width, setWidth] = useState(0)
  const [place, setPlace] = useState<ChartPlace | null>(null)
  useLayoutEffect(() => {
    const element = box.current
    if (!element) return
    const observer = new ResizeObserver(([entry]) => setWidth(Math.floor(entry!.contentRect.width)))
    observer.observe(element)
    return () => observer.disconnect()
  }, [])
  const { current, progress } = analysis
  const { grid, size } = current?.spec ?? spec
  const panelMm = size.widthMm / grid.columns
  const zoom = width / (panelMm * pixelsPerMm)
  const height = Math.round((size.heightMm / grid.rows) * pixelsPerMm * zoom)
  const look = useMemo(() => scaleLook(defaultLook, (96 / 72) * zoom), [zoom])
  const draw = useCallback(
    (frame: Frame) => {
      const panel = current!.spec.panels[index]!
      return kindOf(panel.kind).build(current!.panels[index]!, panel, frame)
    },
    [current, index],
  )
  const edited = spec.panels[index]
  const fit = edited && "fit" in edited ? edited.fit : null
  const window = fit && "window" in fit ? (fit.window as [number | null, number | null]) : null
  const result = current?.panels[index]
  const points = useMemo(() => gridOf(result), [result])
  const abscissa =
    result && "abscissa" in result ? (result.abscissa as { name: string; unit: string | null }) : null
  return (
    <figure className="m-0 p-4" aria-label="Working view">
      <div ref={box} className="relative bg-plate text-plate-ink" style={{ minHeight: height || 240 }}>
        {current && result && width > 0 ? (
          <>
            <WorkingChart
              draw={draw}
              look={look}
              width={width}
              height={height}
              typeset={typesetAll}
              onReady={setPlace}
            />
            {place && window && points.length > 3 && (
              <FitWindow
                scale={place}
                grid={points}
                window={window}
                symbol={abscissa?.name ?? "t"}
                unit={abscissa?.unit ?? null}
                onChange={onWindow}
              />
            )}
          </>
        ) : (
          <div className="p-4">
            <ProgressLine
              what={progress?.what ?? "Starting the analysis"}
              done={progress ? Math.round(progress.share * 100) : undefined}
              total={progress ? 100 : undefined}
              unit="%"
            />
          </div>
        )}
      </div>
      <figcaption className="mt-5 text-fine text-soft">
        Working view: drag the handles of the fit window, or move them with the arrow keys.
      </figcaption>
    </figure>
  )
}

/** All abscissas at which a curve of the panel can be fitted, increasing. */
function gridOf(result: object | undefined): readonly number[] {
  if (!result || !("curves" in result)) return []
  const curves = result.curves as readonly { abscissa?: readonly number[] }[]
  return [...new Set(curves.flatMap((curve) => curve.abscissa ?? []))]
    .filter((t) => t > 0)
    .sort((a, b) => a - b)
}
