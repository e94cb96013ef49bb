import type { FontFamily } from "@specs/chart/drawing"
import { baselineOffset, type Shape, type TextShape } from "@specs/chart/shape"
import type { SetRuns } from "./set-runs"

function TextView({ shape, label, family }: { shape: TextShape; label: SetRuns; family: FontFamily }) {
  const { dx, dy } = baselineOffset(shape, label)
  const { fontPt } = shape
  return (
    <g
      transform={`translate(${shape.x},${shape.y}) rotate(${shape.angle})`}
      fill={shape.color}
      color={shape.color}
    >
      {label.runs.map((run, index) =>
        run.type === "text" ? (
          <text
            key={index}
            x={dx + run.x * fontPt}
            y={dy - run.rise * fontPt}
            fontFamily={`"${family}"`}
            fontSize={fontPt * run.scale}
            xmlSpace="preserve"
          >
            {run.text}
          </text>
        ) : (
          <g
            key={index}
            transform={`translate(${dx + run.x * fontPt},${dy}) scale(${fontPt / 1000})`}
            // Paths only: made by our own server's typesetter, which strips everything else.
            dangerouslySetInnerHTML={{ __html: run.body }}
          />
        ),
      )}
    </g>
  )
}

/** What the layout sets around and into a frame, as SVG. */
export function ShapeView({
  shape,
  set,
  family,
}: {
  shape: Shape
  set: (text: string) => SetRuns
  family: FontFamily
}) {
  if (shape.type === "text") return <TextView shape={shape} label={set(shape.text)} family={family} />
  if (shape.type === "image") {
    const { href, x, y, width, height } = shape
    return (
      <image
        href={href}
        x={x}
        y={y}
        width={width}
        height={height}
        preserveAspectRatio="none"
        style={{ imageRendering: "pixelated" }}
      />
    )
  }
  return (
    <path
      d={shape.d}
      fill={shape.fill ?? "none"}
      stroke={shape.stroke ?? "none"}
      strokeWidth={shape.widthPt}
      strokeDasharray={shape.dash && shape.dash.length > 0 ? shape.dash.join(",") : undefined}
    />
  )
}
