import { Fragment, useEffect, useId, useRef, useState } from "react"
import { MathText } from "@/components/parts/math-text"
import type { Sentence, SentencePart } from "@specs/figure-kind"
import type { SpecIssue } from "@specs/spec-error"
import { SlotControlView, type SlotSurroundings } from "./slot-control"

type Slot = Extract<SentencePart, { type: "slot" }>

/**
 * The panel as a sentence. Left and right arrows go from slot to slot, Enter opens one under its line, Escape closes it;
 * a change applies at once.
 */
export function SentenceView({
  sentence,
  issues,
  surroundings,
  valueOf,
  onChange,
}: {
  sentence: Sentence
  issues: readonly SpecIssue[]
  surroundings: SlotSurroundings
  /** Present value at a slot's pointer, relative to the panel. */
  valueOf: (pointer: string) => unknown
  onChange: (pointer: string, value: unknown) => void
}) {
  const [openId, setOpenId] = useState<string | null>(null)
  const box = useRef<HTMLDivElement>(null)
  const slots = sentence.parts.filter((part): part is Slot => part.type === "slot")
  const open = slots.find((slot) => slot.id === openId)

  const focusSlot = (id: string) =>
    box.current?.querySelector<HTMLButtonElement>(`[data-slot="${CSS.escape(id)}"]`)?.focus()
  const step = (from: string, by: number) => {
    const index = slots.findIndex((slot) => slot.id === from)
    const next = slots[(index + by + slots.length) % slots.length]
    if (next) focusSlot(next.id)
  }

  return (
    <div ref={box} className="relative">
      <p className="m-0 max-w-[54rem] font-serif text-[1.125rem] leading-[1.95rem]">
        {sentence.parts.map((part, index) =>
          part.type === "words" ? (
            <Fragment key={index}>
              <MathText text={part.text} />
            </Fragment>
          ) : (
            <SlotButton
              key={part.id}
              slot={part}
              isOpen={part.id === openId}
              problem={issues.find((issue) => issue.pointer.endsWith(part.pointer))?.message}
              onToggle={() => setOpenId(part.id === openId ? null : part.id)}
              onStep={(by) => step(part.id, by)}
            />
          ),
        )}
      </p>
      {open && (
        <SlotPlace
          key={open.id}
          slot={open}
          anchor={() =>
            box.current?.querySelector<HTMLElement>(`[data-slot="${CSS.escape(open.id)}"]`) ?? null
          }
          onClose={() => {
            setOpenId(null)
            focusSlot(open.id)
          }}
        >
          <SlotControlView
            control={open.control}
            label={open.accepts}
            value={valueOf(open.pointer)}
            surroundings={surroundings}
            onChange={(value) => {
              const { whenEmpty } = open
              if (value == null && whenEmpty)
                onChange(whenEmpty.pointer, whenEmpty.put === "null" ? null : undefined)
              else onChange(open.pointer, value)
            }}
          />
        </SlotPlace>
      )}
    </div>
  )
}

function SlotButton({
  slot,
  isOpen,
  problem,
  onToggle,
  onStep,
}: {
  slot: Slot
  isOpen: boolean
  problem: string | undefined
  onToggle: () => void
  onStep: (by: number) => void
}) {
  const id = useId()
  return (
    <>
      <button
        type="button"
        data-slot={slot.id}
        aria-expanded={isOpen}
        aria-describedby={`${id}-accepts`}
        onClick={onToggle}
        onKeyDown={(event) => {
          if (event.key === "ArrowRight") onStep(1)
          else if (event.key === "ArrowLeft") onStep(-1)
          else return
          event.preventDefault()
        }}
        className={`inline min-h-6 border-b-2 border-dotted px-0.5 font-sans text-[1.03rem] leading-6 hover:border-solid focus-visible:border-solid ${
          problem ? "border-wrong text-wrong-ink" : isOpen ? "border-solid border-ink" : "border-rule"
        }`}
      >
        <MathText text={slot.text} />
      </button>
      <span id={`${id}-accepts`} hidden>
        {slot.accepts}
        {problem ? `. ${problem}` : ""}
      </span>
    </>
  )
}

/** The open control, placed under the line of its slot and inside the sentence's width. */
function SlotPlace({
  slot,
  anchor,
  onClose,
  children,
}: {
  slot: Slot
  anchor: () => HTMLElement | null
  onClose: () => void
  children: React.ReactNode
}) {
  const place = useRef<HTMLDivElement>(null)
  useEffect(() => {
    const button = anchor()
    const panel = place.current
    if (!button || !panel) return
    const room = (panel.offsetParent as HTMLElement | null)?.clientWidth ?? 0
    panel.style.top = `${button.offsetTop + button.offsetHeight + 6}px`
    panel.style.left = `${Math.max(0, Math.min(button.offsetLeft, room - panel.offsetWidth))}px`
    panel.querySelector<HTMLElement>("input, select, textarea, button")?.focus()
    // The place is decided once, when the slot opens: the control must not jump while its value changes the sentence.
    // eslint-disable-next-line react-hooks/exhaustive-deps -- see above
  }, [])
  return (
    // eslint-disable-next-line jsx-a11y/no-noninteractive-element-interactions -- Escape and leaving close the group as a whole
    <div
      ref={place}
      role="group"
      aria-label={slot.accepts}
      onKeyDown={(event) => {
        if (event.key !== "Escape") return
        event.stopPropagation()
        onClose()
      }}
      onBlur={(event) => {
        const to = event.relatedTarget as HTMLElement | null
        if (to && !event.currentTarget.contains(to) && to.dataset.slot !== slot.id) onClose()
      }}
      className="absolute z-20 w-80 max-w-full rounded-sheet border border-rule bg-raised p-3"
    >
      <p className="mt-0 mb-2 text-fine text-soft">{slot.accepts}</p>
      {children}
      <div className="mt-2 text-right">
        <button type="button" onClick={onClose} className="min-h-6 text-small underline underline-offset-4">
          Close
        </button>
      </div>
    </div>
  )
}
