import { LabelError } from "@specs/chart/label-error"

const longestTex = 500

/**
 * Commands that the loaded packages define but that a label has no use for: they pass attributes or links through
 * (\mmlToken), make boxes of any size, break lines, number equations or define new commands.
 */
const refused = new Set(
  (
    "mmlToken href url style class cssId data unicode require color textcolor colorbox fcolorbox definecolor bbox " +
    "includegraphics input write special char verb toggle mathtip texttip enclose " +
    "rule Rule Space hspace vspace kern mkern mskip hskip mspace hfil hfill hfilll raise lower moveleft moveright " +
    "llap rlap mathllap mathrlap mathclap hphantom vphantom smash vcenter mathchoice buildrel Huge huge LARGE Large large " +
    "tag notag label ref eqref nonumber displaylines eqalign eqalignno leqalignno newline cr hline hdashline " +
    "allowbreak goodbreak break parbox " +
    "DeclareMathOperator newcommand renewcommand newenvironment renewenvironment providecommand def let gdef edef " +
    "begingroup endgroup"
  ).split(" "),
)

/** Commands in a formula, with the place at which each starts. */
function* commandsOf(tex: string): Generator<{ readonly name: string; readonly at: number }> {
  for (const match of tex.matchAll(/\\([A-Za-z]+|[^A-Za-z])/g)) yield { name: match[1]!, at: match.index }
}

/** Refuses what must not reach the TeX engine. @throws LabelError tex-forbidden, tex-too-long */
export function checkTex(tex: string): void {
  if (tex.length > longestTex)
    throw new LabelError(
      "tex-too-long",
      `A formula may have at most ${longestTex} characters.`,
      longestTex + 1,
    )
  for (const { name, at } of commandsOf(tex)) {
    if (refused.has(name))
      throw new LabelError("tex-forbidden", `\\${name} is not available in a label.`, at + 1)
    if (name === "\\")
      throw new LabelError("tex-forbidden", "A label has one line: \\\\ is not available.", at + 1)
  }
}
