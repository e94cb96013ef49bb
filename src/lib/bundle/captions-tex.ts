import { texOfText } from "@/lib/domain/tex-text"
import type { DraftRecord } from "./draft-record"

/** 0 is A, 25 Z, 26 AA: macro names hold letters only. */
function letters(index: number): string {
  const own = String.fromCharCode(65 + (index % 26))
  return index < 26 ? own : letters(Math.floor(index / 26) - 1) + own
}

/**
 * captions.tex: for each figure its caption as it was written, the statistics as the product says them, and both
 * together; `\captionOfA`, `\statisticsOfA`, `\fullCaptionOfA` for the first.
 */
export function captionsTex({ manuscript, draft, figures }: DraftRecord): string {
  const heading = `% Captions of ${manuscript.title.replace(/\s+/g, " ")}, ${draft.title}\n`
  const blocks = figures.map(({ name, version, caption, sentence }, at) => {
    const own = letters(at)
    // The closing brace on a line of its own: a comment at the end of a caption must not swallow it.
    return `% Figure ${at + 1}: ${name}, version ${version}
\\newcommand{\\captionOf${own}}{${caption.trim()}%
}
\\newcommand{\\statisticsOf${own}}{${texOfText(sentence)}}
\\newcommand{\\fullCaptionOf${own}}{\\captionOf${own}{} \\statisticsOf${own}{}}
`
  })
  return [heading, ...blocks].join("\n")
}
