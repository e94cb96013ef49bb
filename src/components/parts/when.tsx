const day = new Intl.DateTimeFormat("en-GB", {
  day: "numeric",
  month: "short",
  year: "numeric",
  timeZone: "UTC",
})
const time = new Intl.DateTimeFormat("en-GB", { hour: "2-digit", minute: "2-digit", timeZone: "UTC" })

const steps: readonly [Intl.RelativeTimeFormatUnit, number][] = [
  ["year", 31_557_600],
  ["month", 2_629_800],
  ["week", 604_800],
  ["day", 86_400],
  ["hour", 3_600],
  ["minute", 60],
]
const relative = new Intl.RelativeTimeFormat("en", { numeric: "auto" })

/** "3 days ago", counted from `now`. */
export function ago(at: Date, now: Date): string {
  const seconds = (at.getTime() - now.getTime()) / 1000
  const step = steps.find(([, length]) => Math.abs(seconds) >= length)
  return step ? relative.format(Math.round(seconds / step[1]), step[0]) : "just now"
}

/** The one way to write a date: absolute, with the relative distance as a hint. */
export function When({ at, now }: { at: string; now?: Date }) {
  const date = new Date(at)
  return (
    <time
      dateTime={at}
      title={`${time.format(date)} UTC${now ? `, ${ago(date, now)}` : ""}`}
      className="whitespace-nowrap"
    >
      {day.format(date)}
      <span className="visually-hidden">, {time.format(date)} UTC</span>
    </time>
  )
}
