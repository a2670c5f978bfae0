/** A point and where it was found, with how much to trust it. */
export type Pair = Readonly<{ x: number; y: number; u: number; v: number; weight: number }>

/** u = a x + c y + e, v = b x + d y + f, as [a b c d e f]. */
type Six = readonly [number, number, number, number, number, number]

/**
 * The affine map through pairs by weighted least squares, leaving out what lies further than `off` from the rest. With too few
 * pairs, or pairs on one line, it is a plain shift by their median.
 */
export function fitAffine(pairs: readonly Pair[], off: number): Six {
  const shift: Six = [1, 0, 0, 1, median(pairs.map((p) => p.u - p.x)), median(pairs.map((p) => p.v - p.y))]
  let map = shift
  for (const limit of [off * 3.5, off * 2, off, off]) {
    const near = pairs.filter((p) => distance(map, p) <= limit)
    if (near.length < 5) return map
    const better = leastSquares(near)
    if (!better || !modest(better)) return map
    map = better
  }
  return map
}

function distance([a, b, c, d, e, f]: Six, { x, y, u, v }: Pair): number {
  return Math.hypot(a * x + c * y + e - u, b * x + d * y + f - v)
}
/** Paper does not stretch by more than 5 %, nor turn by more than 3 degrees against what the slope of its lines said. */
function modest([a, b, c, d]: Six): boolean {
  return Math.abs(a - 1) < 0.05 && Math.abs(d - 1) < 0.05 && Math.abs(b) < 0.05 && Math.abs(c) < 0.05
}
function median(values: readonly number[]): number {
  const sorted = [...values].sort((p, q) => p - q)
  return sorted[sorted.length >> 1] ?? 0
}

function leastSquares(pairs: readonly Pair[]): Six | null {
  let [n, sx, sy, sxx, sxy, syy] = [0, 0, 0, 0, 0, 0]
  const right = [[0, 0, 0], [0, 0, 0]]
  for (const { x, y, u, v, weight } of pairs) {
    n += weight
    sx += weight * x
    sy += weight * y
    sxx += weight * x * x
    sxy += weight * x * y
    syy += weight * y * y
    for (const [k, to] of [u, v].entries()) {
      right[k]![0]! += weight * x * to
      right[k]![1]! += weight * y * to
      right[k]![2]! += weight * to
    }
  }
  const det = sxx * (syy * n - sy * sy) - sxy * (sxy * n - sy * sx) + sx * (sxy * sy - syy * sx)
  if (Math.abs(det) < 1e-3 * n) return null
  const one = ([p, q, r]: number[]): [number, number, number] => [
    (p! * (syy * n - sy * sy) - sxy * (q! * n - sy * r!) + sx * (q! * sy - syy * r!)) / det,
    (sxx * (q! * n - r! * sy) - p! * (sxy * n - sy * sx) + sx * (sxy * r! - q! * sx)) / det,
    (sxx * (syy * r! - q! * sy) - sxy * (sxy * r! - q! * sx) + p! * (sxy * sy - syy * sx)) / det,
  ]
  const [a, c, e] = one(right[0]!)
  const [b, d, f] = one(right[1]!)
  return [a, b, c, d, e, f]
}
