export const colorVisions = ["protanopia", "deuteranopia", "tritanopia", "grey"] as const
/** Whose eyes: without long-, middle- or short-wave cones, or a black-and-white print. */
export type ColorVision = (typeof colorVisions)[number]

type Row = readonly [number, number, number]

/**
 * What linear red, green and blue become for each. The first three are the matrices for complete deficiency of Machado,
 * Oliveira and Fernandes, IEEE Trans. Vis. Comput. Graph. 15, 1291 (2009), table 1; grey is relative luminance, ITU-R
 * BT.709.
 */
const matrices: Record<ColorVision, readonly [Row, Row, Row]> = {
  protanopia: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  deuteranopia: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
  tritanopia: [
    [1.255528, -0.076749, -0.178779],
    [-0.078411, 0.930809, 0.147602],
    [0.004733, 0.691367, 0.3039],
  ],
  grey: [
    [0.2126, 0.7152, 0.0722],
    [0.2126, 0.7152, 0.0722],
    [0.2126, 0.7152, 0.0722],
  ],
}

/** Linear light of each of the 256 values of a channel. @see IEC 61966-2-1 */
const linear = Float64Array.from({ length: 256 }, (_, value) => {
  const share = value / 255
  return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4
})

function encoded(light: number): number {
  const share = Math.min(1, Math.max(0, light))
  return Math.round(255 * (share <= 0.0031308 ? 12.92 * share : 1.055 * share ** (1 / 2.4) - 0.055))
}

/** Changes pixels, three bytes each, in place into what those eyes see of them. The matrices act on linear light. */
export function simulateColorVision(pixels: Uint8Array, vision: ColorVision): void {
  const matrix = matrices[vision]
  const known = new Map<number, number>()
  for (let at = 0; at + 2 < pixels.length; at += 3) {
    const color = (pixels[at]! << 16) | (pixels[at + 1]! << 8) | pixels[at + 2]!
    let seen = known.get(color)
    if (seen === undefined) {
      const light = [linear[pixels[at]!]!, linear[pixels[at + 1]!]!, linear[pixels[at + 2]!]!]
      const [r, g, b] = matrix.map((row) =>
        encoded(row[0] * light[0]! + row[1] * light[1]! + row[2] * light[2]!),
      )
      seen = (r! << 16) | (g! << 8) | b!
      // A drawing has few colours; a photograph would only fill the memory.
      if (known.size < 65536) known.set(color, seen)
    }
    pixels[at] = seen >> 16
    pixels[at + 1] = (seen >> 8) & 255
    pixels[at + 2] = seen & 255
  }
}
