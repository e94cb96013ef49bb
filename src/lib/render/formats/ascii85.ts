/** Bytes as ASCII base 85 with its end mark, in lines of at most 80 characters. @see PLRM 3rd edition, section 3.13.3 */
export function ascii85(bytes: Uint8Array): string {
  let line = ""
  const lines: string[] = []
  const put = (group: string) => {
    line += group
    if (line.length >= 75) {
      lines.push(line)
      line = ""
    }
  }
  for (let k = 0; k < bytes.length; k += 4) {
    const count = Math.min(4, bytes.length - k)
    let value = 0
    for (let j = 0; j < 4; j += 1) value = value * 256 + (j < count ? bytes[k + j]! : 0)
    if (value === 0 && count === 4) {
      put("z")
      continue
    }
    const digits: string[] = []
    for (let j = 0; j < 5; j += 1) {
      digits.unshift(String.fromCharCode(33 + (value % 85)))
      value = Math.floor(value / 85)
    }
    put(digits.slice(0, count + 1).join(""))
  }
  return [...lines, `${line}~>`].join("\n")
}
