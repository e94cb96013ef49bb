import { Button as AriaButton, type ButtonProps as AriaButtonProps } from "react-aria-components"

const base =
  "inline-flex min-h-8 items-center gap-2 rounded-sheet px-3 text-small outline-offset-2 " +
  "transition-colors duration-100 disabled:cursor-not-allowed data-[disabled]:cursor-not-allowed " +
  "data-[focus-visible]:outline-2 data-[focus-visible]:outline-ink"

/** `act` is the one thing a place is for; `plain` the rest; `quiet` lives inside text and margins; `grave` cannot be undone. */
const looks = {
  act: "font-semibold bg-ink text-paper hover:bg-soft data-[disabled]:bg-soft",
  plain: "font-semibold border border-rule text-ink hover:bg-sunk data-[disabled]:text-soft",
  quiet:
    "min-h-6 px-0 underline decoration-rule decoration-dotted underline-offset-4 hover:decoration-solid " +
    "data-[disabled]:text-soft",
  grave: "font-semibold border border-wrong text-wrong-ink hover:bg-wrong-tint data-[disabled]:text-soft",
} as const

export type ButtonLook = keyof typeof looks

export interface ButtonProps extends Omit<AriaButtonProps, "className"> {
  readonly look?: ButtonLook
}

/** The one button. Its text is the act: "font-semibold Save version", "Sign off Draft 1". */
export function Button({ look = "plain", ...props }: ButtonProps) {
  return <AriaButton {...props} className={`${base} ${looks[look]}`} />
}

/** A link that looks like the button of the same importance, for acts that are a page. */
export function ButtonLink({
  look = "plain",
  children,
  ...props
}: { look?: ButtonLook } & Omit<React.ComponentProps<"a">, "className">) {
  return (
    <a {...props} className={`${base} ${looks[look]} no-underline`}>
      {children}
    </a>
  )
}
