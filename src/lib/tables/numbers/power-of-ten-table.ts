/** Powers of ten as unevaluated sums of two doubles, high + low, for exponents -LARGEST..LARGEST. */
export const LARGEST_TABLE_EXPONENT = 250

/** 10^0 … 10^22, the powers that a double holds exactly. */
export const exactPowers = Float64Array.from({ length: 23 }, (_, exponent) => Number(`1e${exponent}`))

const SIZE = 2 * LARGEST_TABLE_EXPONENT + 1
/** Nearest double to 10^(index - LARGEST). */
export const powerHigh = new Float64Array(SIZE)
/** 10^(index - LARGEST) minus its nearest double, to about 53 further bits. */
export const powerLow = new Float64Array(SIZE)

/** A double as mantissa x 2^exponent with an integer mantissa. */
function integerParts(value: number): [bigint, number] {
  const view = new DataView(new ArrayBuffer(8))
  view.setFloat64(0, value)
  const bits = view.getBigUint64(0)
  const exponent = Number((bits >> 52n) & 0x7ffn)
  const fraction = bits & 0xfffffffffffffn
  return exponent === 0 ? [fraction, -1074] : [fraction | (1n << 52n), exponent - 1075]
}

/** numerator / denominator to 53 bits or better. */
function ratio(numerator: bigint, denominator: bigint): number {
  if (numerator < 0n) return -ratio(-numerator, denominator)
  if (numerator === 0n) return 0
  const shift = 64 - (numerator.toString(2).length - denominator.toString(2).length)
  const quotient =
    shift >= 0 ? (numerator << BigInt(shift)) / denominator : numerator / (denominator << BigInt(-shift))
  return Number(quotient) * 2 ** -shift
}

for (let exponent = -LARGEST_TABLE_EXPONENT; exponent <= LARGEST_TABLE_EXPONENT; exponent++) {
  const high = Number(`1e${exponent}`)
  const [mantissa, binary] = integerParts(high)
  const ten = 10n ** BigInt(Math.abs(exponent))
  // 10^e = numerator / denominator exactly, and high likewise: their difference is the low part.
  const [top, bottom] = exponent >= 0 ? [ten, 1n] : [1n, ten]
  const [highTop, highBottom] =
    binary >= 0 ? [mantissa << BigInt(binary), 1n] : [mantissa, 1n << BigInt(-binary)]
  powerHigh[exponent + LARGEST_TABLE_EXPONENT] = high
  powerLow[exponent + LARGEST_TABLE_EXPONENT] = ratio(
    top * highBottom - highTop * bottom,
    bottom * highBottom,
  )
}
