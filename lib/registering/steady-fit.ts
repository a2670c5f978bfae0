import { compose, inverse, toPixels, type Homography } from '@/lib/core/paper-space'
import type { Pair } from './fit-affine'

/** How far tracks lie off a perfect scan, in pixels of 100 dpi; neighbours err together, so this is more than each one's own. */
const noise = 0.5
/** How far scanners stretch one way more than the other, lean, and widen towards an edge (shares of a length): what is beyond is no scan of a flat sheet. */
const expected = { aspect: 0.002, lean: 0.001, widen: 0.002 }
/** Half a page, in pixels of 100 dpi. */
const reach = 550

/**
 * The map of a page through pairs (template to leaf pixels, both of 100 dpi): turned, shifted and scaled freely; stretched, leaning or widening
 * only so far as the print shows it beyond what a scanner is expected to do. Where print stands all over a page that makes no difference; where two
 * lines stand at its top they alone must not say how long the page is. Null when the pairs span nothing.
 */
export function steadyFit(pairs: readonly Pair[]): Homography | null {
  const scan = similarity(pairs)
  if (!scan) return null
  const [cx, cy] = [mean(pairs.map(({ x }) => x)), mean(pairs.map(({ y }) => y))]
  const back = inverse(scan)
  const equations = pairs.flatMap(({ x, y, u, v }) => {
    const seen = toPixels(back, { x: u, y: v })
    const [p, q] = [x - cx, y - cy]
    return [
      { at: [1, 0, p, -q, p, q, (p * p) / reach, (p * q) / reach], is: seen.x - x },
      { at: [0, 1, q, p, -q, p, (p * q) / reach, (q * q) / reach], is: seen.y - y },
    ]
  })
  const priors = [0, 0, 0, 0, expected.aspect, expected.lean, expected.widen, expected.widen].map((width) => (width ? (noise / width) ** 2 : 0))
  const found = solve(equations, priors)
  if (!found) return null
  const [tx, ty, s, r, a, l, gx, gy] = found as [number, number, number, number, number, number, number, number]
  // x' = x (1 + g.p / reach) + ... is the first order of a division by 1 - g.p / reach
  const bend: Homography = [[1 + s + a, -r + l, tx], [r + l, 1 + s - a, ty], [-gx / reach, -gy / reach, 1]]
  return compose(scan, compose([[1, 0, cx], [0, 1, cy], [0, 0, 1]], compose(bend, [[1, 0, -cx], [0, 1, -cy], [0, 0, 1]])))
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / Math.max(1, values.length)
}

/** Turn, shift and one scale by least squares. */
function similarity(pairs: readonly Pair[]): Homography | null {
  const [mx, my, mu, mv] = (['x', 'y', 'u', 'v'] as const).map((key) => mean(pairs.map((pair) => pair[key]))) as [number, number, number, number]
  let [dot, cross, square] = [0, 0, 0]
  for (const { x, y, u, v } of pairs) {
    dot += (x - mx) * (u - mu) + (y - my) * (v - mv)
    cross += (x - mx) * (v - mv) - (y - my) * (u - mu)
    square += (x - mx) ** 2 + (y - my) ** 2
  }
  if (square < 100 * pairs.length) return null
  const [a, b] = [dot / square, cross / square]
  return [[a, -b, mu - a * mx + b * my], [b, a, mv - b * mx - a * my], [0, 0, 1]]
}

/** Least squares with a weight that holds each unknown to 0. */
function solve(equations: readonly Readonly<{ at: readonly number[]; is: number }>[], priors: readonly number[]): number[] | null {
  const n = priors.length
  const rows = priors.map((prior, k) => Array.from({ length: n + 1 }, (_, j) => (j === k ? prior : 0)))
  for (const { at, is } of equations)
    for (let k = 0; k < n; k++) {
      for (let j = 0; j < n; j++) rows[k]![j]! += at[k]! * at[j]!
      rows[k]![n]! += at[k]! * is
    }
  for (let k = 0; k < n; k++) {
    let pivot = k
    for (let r = k + 1; r < n; r++) if (Math.abs(rows[r]![k]!) > Math.abs(rows[pivot]![k]!)) pivot = r
    if (Math.abs(rows[pivot]![k]!) < 1e-6) return null
    ;[rows[k], rows[pivot]] = [rows[pivot]!, rows[k]!]
    for (let r = 0; r < n; r++) {
      if (r === k) continue
      const by = rows[r]![k]! / rows[k]![k]!
      for (let j = k; j <= n; j++) rows[r]![j]! -= by * rows[k]![j]!
    }
  }
  return rows.map((row, k) => row[n]! / row[k]!)
}
