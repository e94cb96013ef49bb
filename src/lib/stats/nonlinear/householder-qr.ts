/**
 * Orthogonal factor and triangle of an n x p matrix, n >= p, sharing the matrix's own storage: the triangle above the
 * diagonal, the reflectors on and below it.
 */
export interface QrFactors {
  readonly rows: number
  readonly columns: number
  readonly storage: Float64Array
  /** Diagonal of the triangle R, length p. */
  readonly diagonal: Float64Array
}

/**
 * Householder QR in place. Columns are expected at similar scale; nothing is pivoted.
 *
 * @param storage row-major n x p matrix, overwritten; may be longer than n p
 * @see Golub & Van Loan, Matrix Computations, section 5.2
 */
export function factorQr(
  storage: Float64Array,
  rows: number,
  columns: number,
  diagonal: Float64Array = new Float64Array(columns),
): QrFactors {
  for (let j = 0; j < columns; j += 1) {
    let squares = 0
    for (let i = j; i < rows; i += 1) squares += storage[i * columns + j]! ** 2
    const head = storage[j * columns + j]!
    const norm = Math.sqrt(squares)
    // The sign that adds, so that the reflector's head loses no digits.
    diagonal[j] = head > 0 ? -norm : norm
    if (norm === 0) continue
    storage[j * columns + j] = head - diagonal[j]!
    const scale = -1 / (diagonal[j]! * storage[j * columns + j]!)
    for (let c = j + 1; c < columns; c += 1) {
      let dot = 0
      for (let i = j; i < rows; i += 1) dot += storage[i * columns + j]! * storage[i * columns + c]!
      dot *= scale
      for (let i = j; i < rows; i += 1) {
        const at = i * columns + c
        storage[at] = storage[at]! - dot * storage[i * columns + j]!
      }
    }
  }
  return { rows, columns, storage, diagonal }
}

function reflect({ rows, columns, storage, diagonal }: QrFactors, j: number, vector: Float64Array): void {
  if (diagonal[j] === 0) return
  let dot = 0
  for (let i = j; i < rows; i += 1) dot += storage[i * columns + j]! * vector[i]!
  dot *= -1 / (diagonal[j]! * storage[j * columns + j]!)
  for (let i = j; i < rows; i += 1) vector[i] = vector[i]! - dot * storage[i * columns + j]!
}

/** Overwrites a vector of n values with Q' times it; its first p values are then the part inside the column space. */
export function applyQTranspose(qr: QrFactors, vector: Float64Array): void {
  for (let j = 0; j < qr.columns; j += 1) reflect(qr, j, vector)
}

/** Overwrites a vector of n values with Q times it. */
export function applyQ(qr: QrFactors, vector: Float64Array): void {
  for (let j = qr.columns - 1; j >= 0; j -= 1) reflect(qr, j, vector)
}

/** Solves R x = the first p values of the vector. */
export function solveTriangle({ columns, storage, diagonal }: QrFactors, vector: Float64Array): Float64Array {
  const x = new Float64Array(columns)
  for (let j = columns - 1; j >= 0; j -= 1) {
    let rest = vector[j]!
    for (let c = j + 1; c < columns; c += 1) rest -= storage[j * columns + c]! * x[c]!
    x[j] = rest / diagonal[j]!
  }
  return x
}

/** Smallest over largest size of the triangle's diagonal: below 1e-10 the columns do not determine their coefficients. */
export function diagonalRatio({ diagonal }: QrFactors): number {
  let smallest = Infinity
  let largest = 0
  for (const value of diagonal) {
    smallest = Math.min(smallest, Math.abs(value))
    largest = Math.max(largest, Math.abs(value))
  }
  return largest > 0 ? smallest / largest : 0
}

/** (R'R)^-1, the inverse of the normal matrix without forming it; row-major p x p. */
export function inverseNormal(qr: QrFactors): Float64Array {
  const p = qr.columns
  const inverse = Array.from({ length: p }, (_, j) => {
    const unit = new Float64Array(p)
    unit[j] = 1
    return solveTriangle(qr, unit)
  })
  const out = new Float64Array(p * p)
  for (let a = 0; a < p; a += 1)
    for (let b = 0; b < p; b += 1) {
      let sum = 0
      for (let j = 0; j < p; j += 1) sum += inverse[j]![a]! * inverse[j]![b]!
      out[a * p + b] = sum
    }
  return out
}
