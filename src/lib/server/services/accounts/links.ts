import { env } from "@/lib/server/env"

/** Pages that a link in a mail opens; the secret is used by that page's own button, never by opening it. */
export type LinkPage = "confirm" | "password-reset" | "invitation" | "sign-in"

/** Full address of a page, with the link's secret. */
export function linkTo(page: LinkPage, secret?: string): string {
  const address = new URL(`/${page}`, env().PUBLIC_URL)
  if (secret !== undefined) address.searchParams.set("token", secret)
  return address.href
}
