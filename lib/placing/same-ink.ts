import { inflateRawSync } from 'node:zlib'
import type { InkMap } from '@/lib/core/leaf'

/** Whether two leaves of one page carry the same writing: a second scan of the sheet, another student's, or too little is written to say. */
export type Sameness = 'same' | 'different' | 'unknown'

const sameFrom = 0.84
const differentTo = 0.76
/** Fewer squares with ink than this say nothing. */
const fewest = 12

/** The ink of a leaf as numbers, to be compared many times. Null when next to nothing is written. */
export function inkOf(map: InkMap | null): Float32Array | null {
  if (!map) return null
  const cells = Float32Array.from(inflateRawSync(Buffer.from(map, 'base64')))
  const inked = cells.reduce((n, v) => n + (v > 8 ? 1 : 0), 0)
  if (inked < fewest) return null
  const mean = cells.reduce((sum, v) => sum + v, 0) / cells.length
  const length = Math.sqrt(cells.reduce((sum, v) => sum + (v - mean) ** 2, 0))
  return cells.map((v) => (v - mean) / length)
}

/** Correlation of two inks, -1 to 1. */
export function likeness(a: Float32Array, b: Float32Array): number {
  let dot = 0
  for (let k = 0; k < Math.min(a.length, b.length); k++) dot += a[k]! * b[k]!
  return dot
}

export function sameness(a: Float32Array | null, b: Float32Array | null): Sameness {
  if (!a || !b) return a || b ? 'different' : 'unknown'
  const r = likeness(a, b)
  if (r >= sameFrom) return 'same'
  return r <= differentTo ? 'different' : 'unknown'
}
