/**
 * Whether an address is written so that a path test may read it otherwise than the router: doubled slashes,
 * backslashes, encoded separators and dots, NUL. Nothing of ours has such an address.
 */
export function isOddPath(url: string): boolean {
  const path = url.replace(/^[a-z]+:\/\/[^/?#]*/i, "").replace(/[?#].*$/s, "")
  return /\/\/|\\|%(2f|5c|2e|00|25)|\/\.\.?(\/|$)/i.test(path)
}
