/** An affine map: x' = a x + c y + e, y' = b x + d y + f. */
export type Matrix = readonly [a: number, b: number, c: number, d: number, e: number, f: number]

export const identity: Matrix = [1, 0, 0, 1, 0, 0]

/** The map that applies `inner` first and `outer` then. */
export function compose(outer: Matrix, inner: Matrix): Matrix {
  const [a, b, c, d, e, f] = outer
  const [p, q, r, s, t, u] = inner
  return [a * p + c * q, b * p + d * q, a * r + c * s, b * r + d * s, a * t + c * u + e, b * t + d * u + f]
}

export const applyTo = ([a, b, c, d, e, f]: Matrix, x: number, y: number): readonly [number, number] => [
  a * x + c * y + e,
  b * x + d * y + f,
]

/** How much a map enlarges lengths on average: the scale of line widths and type. */
export const scaleOfMatrix = ([a, b, c, d]: Matrix): number => Math.sqrt(Math.abs(a * d - b * c))

function oneTransform(name: string, values: readonly number[]): Matrix {
  const [first = 0, second] = values
  if (name === "translate") return [1, 0, 0, 1, first, second ?? 0]
  if (name === "scale") return [first, 0, 0, second ?? first, 0, 0]
  if (name === "rotate" && values.length === 1) {
    const turn = (first * Math.PI) / 180
    return [Math.cos(turn), Math.sin(turn), -Math.sin(turn), Math.cos(turn), 0, 0]
  }
  throw new Error(`SVG: the transform ${name}(${values.join(",")}) is not one that figures use.`)
}

/** Reads a transform attribute. */
export function parseTransform(written: string | undefined): Matrix {
  if (!written) return identity
  return [...written.matchAll(/(\w+)\(([^)]*)\)/g)].reduce<Matrix>(
    (matrix, [, name, values]) =>
      compose(
        matrix,
        oneTransform(
          name!,
          values!
            .split(/[\s,]+/)
            .filter(Boolean)
            .map(Number),
        ),
      ),
    identity,
  )
}
