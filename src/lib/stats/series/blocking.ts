/** One level of a blocking analysis. */
export interface BlockingLevel {
  /** Values averaged into one block. */
  readonly blockSize: number
  readonly blocks: number
  /** Error of the mean if the blocks were independent. */
  readonly standardError: number
  /** Statistical error of that error. */
  readonly uncertainty: number
}

export interface Blocking {
  readonly levels: readonly BlockingLevel[]
  /** The level from which on the error no longer grows; null when it still grows where too few blocks are left. */
  readonly plateau: BlockingLevel | null
}

const fewestBlocks = 20

/**
 * Error of the mean of a correlated stationary series by averaging neighbours pairwise, again and again, until the error
 * stops growing with the size of the blocks.
 *
 * @param values of one stationary stretch, equally spaced; a last value without a neighbour is left out at each level
 * @see Flyvbjerg & Petersen, J. Chem. Phys. 91, 461 (1989)
 */
export function blocking(values: Float64Array): Blocking {
  const levels: BlockingLevel[] = []
  let blocks = values
  for (let blockSize = 1; blocks.length >= fewestBlocks; blockSize *= 2) {
    levels.push(levelOf(blocks, blockSize))
    const pairs = blocks
    blocks = Float64Array.from(
      { length: Math.floor(pairs.length / 2) },
      (_, k) => (pairs[2 * k]! + pairs[2 * k + 1]!) / 2,
    )
  }
  const plateau = levels.findIndex((level, k) => {
    const later = levels.slice(k + 1)
    // Two larger sizes at least have to agree, or there is no plateau to speak of.
    return (
      later.length >= 2 &&
      later.every((other) => other.standardError <= level.standardError + 2 * other.uncertainty)
    )
  })
  return { levels, plateau: plateau < 0 ? null : levels[plateau]! }
}

function levelOf(blocks: Float64Array, blockSize: number): BlockingLevel {
  const n = blocks.length
  const mean = blocks.reduce((sum, value) => sum + value, 0) / n
  const squares = blocks.reduce((sum, value) => sum + (value - mean) ** 2, 0)
  const standardError = Math.sqrt(squares / n / (n - 1))
  return { blockSize, blocks: n, standardError, uncertainty: standardError / Math.sqrt(2 * (n - 1)) }
}
