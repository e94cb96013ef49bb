/** The four crop marks around a plate, outside the artwork. */
function CropMarks() {
  const corner = "absolute size-3 border-rule pointer-events-none"
  return (
    <span aria-hidden="true">
      <span className={`${corner} -top-4 left-0 border-l`} />
      <span className={`${corner} top-0 -left-4 border-t`} />
      <span className={`${corner} -top-4 right-0 border-r`} />
      <span className={`${corner} top-0 -right-4 border-t`} />
      <span className={`${corner} -bottom-4 left-0 border-l`} />
      <span className={`${corner} bottom-0 -left-4 border-b`} />
      <span className={`${corner} right-0 -bottom-4 border-r`} />
      <span className={`${corner} -right-4 bottom-0 border-b`} />
    </span>
  )
}

/**
 * A figure as it will be printed: white in both themes, at true size times a stated zoom, crop marks around it and its
 * width in millimetres under it. Never wider than its place: then the zoom shrinks and the line under it says so.
 */
export function Plate({
  src,
  alt,
  widthMm,
  heightMm,
  zoom = 1,
  children,
  footnote,
}: {
  src: string
  alt: string
  widthMm: number
  heightMm: number
  zoom?: number
  /** Pins and the like, positioned over the artwork in per cent. */
  children?: React.ReactNode
  footnote?: React.ReactNode
}) {
  const percent = Math.round(zoom * 100)
  return (
    <figure className="m-0 p-4">
      <div
        className="relative max-w-full bg-plate"
        style={{ width: `${widthMm * zoom}mm`, aspectRatio: `${widthMm} / ${heightMm}` }}
      >
        <CropMarks />
        <img src={src} alt={alt} className="block size-full" />
        {children}
      </div>
      <figcaption className="mt-5 flex flex-wrap items-baseline gap-x-3 text-fine text-soft">
        <span className="tabular-nums">
          {widthMm} × {heightMm} mm, shown at {percent} % or to fit
        </span>
        {footnote}
      </figcaption>
    </figure>
  )
}
