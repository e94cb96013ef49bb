const QUOTE = 34

const isBlank = (byte: number, delimiter: number): boolean => byte === 32 || (byte === 9 && delimiter !== 9)
const isDelimiter = (byte: number, delimiter: number): boolean =>
  byte === delimiter || (delimiter === 32 && byte === 9)

/**
 * Follows quotes through `bytes[from..to)`.
 *
 * @param delimiter byte of the delimiter; 32 stands for any blank
 * @param open a quote is open at `from`; else a field begins there
 * @returns index of the quote that is still open at `to`, -1 when none is
 */
export function openQuote(bytes: Buffer, from: number, to: number, delimiter: number, open: number): number {
  let at = from
  let opened = open
  for (;;) {
    if (opened < 0) {
      while (at < to && isBlank(bytes[at]!, delimiter)) at++
      if (at >= to) return -1
      if (bytes[at] === QUOTE) opened = at++
    }
    if (opened >= 0) {
      at = bytes.indexOf(QUOTE, at)
      if (at < 0 || at >= to) return opened
      at++
      if (at < to && bytes[at] === QUOTE) {
        at++
        continue
      }
      opened = -1
    }
    while (at < to && !isDelimiter(bytes[at]!, delimiter)) at++
    if (at >= to) return -1
    at++
  }
}
