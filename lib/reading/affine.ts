/** A PDF matrix [a b c d e f]: x' = a x + c y + e, y' = b x + d y + f. */
export type Affine = readonly [number, number, number, number, number, number]

export const identity: Affine = [1, 0, 0, 1, 0, 0]

/** First `first`, then `then`. */
export function chain(first: Affine, then: Affine): Affine {
  const [a, b, c, d, e, f] = first
  const [A, B, C, D, E, F] = then
  return [A * a + C * b, B * a + D * b, A * c + C * d, B * c + D * d, A * e + C * f + E, B * e + D * f + F]
}

/** The way back; null for a matrix that flattens the plane. */
export function undo([a, b, c, d, e, f]: Affine): Affine | null {
  const det = a * d - b * c
  if (Math.abs(det) < 1e-12) return null
  return [d / det, -b / det, -c / det, a / det, (c * f - d * e) / det, (b * e - a * f) / det]
}
