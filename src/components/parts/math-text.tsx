import { useMathBox } from "@/lib/client/typeset"

/** Splits a label at unescaped dollar signs: text at even places, TeX at odd ones. An unclosed dollar is text. */
export function splitMath(label: string): readonly string[] {
  const parts = label.split(/(?<!\\)\$/)
  if (parts.length % 2 === 0) parts.splice(-2, 2, `${parts.at(-2)}$${parts.at(-1)}`)
  return parts.map((part, index) => (index % 2 === 0 ? part.replaceAll("\\$", "$") : part))
}

/** A label with its TeX set as mathematics in the colour and size of the text around it. */
export function MathText({ text }: { text: string }) {
  const parts = splitMath(text)
  return <>{parts.map((part, index) => (index % 2 === 0 ? part : <Maths key={index} tex={part} />))}</>
}

/** One formula. Until it is set, and where it cannot be, its source stands in its place. */
export function Maths({ tex }: { tex: string }) {
  const box = useMathBox(tex)
  if (!box) return <span className="italic">{tex.replace(/\\,|[{}]/g, "")}</span>
  return (
    <svg
      role="img"
      aria-label={tex}
      className="maths"
      viewBox={`0 ${-box.h * 1000} ${box.w * 1000} ${(box.h + box.d) * 1000}`}
      style={{ width: `${box.w}em`, height: `${box.h + box.d}em`, verticalAlign: `${-box.d}em` }}
      // Paths only: made by our own server's typesetter, which strips everything else.
      dangerouslySetInnerHTML={{ __html: box.body }}
    />
  )
}
