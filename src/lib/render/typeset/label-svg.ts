import { written } from "@specs/chart/position"
import { baselineOffset, type TextShape } from "@specs/chart/shape"
import { escapeXml } from "../svg/parse-svg"
import type { LabelRun, SetLabel } from "./set-label"

/** What stands in where a viewer ignores embedded fonts: faces of the same widths first. */
const standIns: Record<string, string> = {
  Arimo: "Arimo,Arial,Helvetica,sans-serif",
  "STIX Two Text": "STIX Two Text,Times New Roman,Times,serif",
}

function textRun(
  run: LabelRun & { type: "text" },
  x: number,
  y: number,
  fontPt: number,
  label: SetLabel,
): string {
  const size = written(fontPt * run.scale)
  const weight = label.bold ? ' font-weight="700"' : ""
  const style = label.italic ? ' font-style="italic"' : ""
  const place = `x="${written(x)}" y="${written(y - run.rise * fontPt)}"`
  const face = `font-family="${standIns[run.family] ?? run.family}" font-size="${size}"${weight}${style}`
  const script = run.scale < 1 ? ' class="script"' : ""
  return `<text ${place} ${face}${script} xml:space="preserve">${escapeXml(run.text)}</text>`
}

/** A set label as SVG: text in the figure's face, mathematics as paths. */
export function labelSvg(shape: TextShape, label: SetLabel): string {
  const { fontPt, color, angle } = shape
  const { dx, dy } = baselineOffset(shape, label)
  const turn = angle === 0 ? "" : ` rotate(${written(angle)})`
  const runs = label.runs.map((run) => {
    const x = dx + run.x * fontPt
    if (run.type === "text") return textRun(run, x, dy, fontPt, label)
    const scale = Math.round((fontPt / 1000) * 1e6) / 1e6
    const body = run.box.body.replaceAll("currentColor", color)
    return `<g class="math" transform="translate(${written(x)},${written(dy)}) scale(${scale})">${body}</g>`
  })
  const place = `translate(${written(shape.x)},${written(shape.y)})${turn}`
  return `<g transform="${place}" fill="${color}">${runs.join("")}</g>`
}
