import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Homography } from '@/lib/core/paper-space'
import type { Pair } from './fit-affine'

/** Half the side of a tracked patch, in pixels. */
const reach = 7
const side = 2 * reach + 1
const area = side * side
const steps = 10
/** Steps shrink to a fraction of the one before, so after one this short the rest does not matter (0.01 mm at 100 dpi). */
const still = 0.05
/** A patch that ends up less alike than this was not found. */
const alike = 0.5

/** What a patch needs besides its pixels: its middle in pixel indices, its slopes' sums, their products with it, and their inverse normal matrix. */
type Facts = Readonly<{ x: number; y: number; sumX: number; sumY: number; dotX: number; dotY: number; inverse: readonly [number, number, number] }>

/** Patches of print made ready for being followed. `values` holds patch (mean 0, length 1), slope across and slope down for each pixel of each in turn. */
export type Tracks = Readonly<{ facts: readonly Facts[]; values: Float32Array }>

/** Makes tracks of the patches round points (pixel indices x, y, x, y ...); those too plain or too near the edge to be followed fall out. */
export function makeTracks(picture: GreyPicture, points: ArrayLike<number>): Tracks {
  const { width, height } = picture
  const facts: Facts[] = []
  const values = new Float32Array((points.length / 2) * area * 3)
  for (let k = 0; k < points.length; k += 2) {
    const [x, y] = [Math.round(points[k]!), Math.round(points[k + 1]!)]
    if (x <= reach || y <= reach || x >= width - reach - 1 || y >= height - reach - 1) continue
    const at = facts.length * area * 3
    const made = makeTrack(picture, x, y, values.subarray(at, at + area * 3))
    if (made) facts.push(made)
  }
  return { facts, values: values.slice(0, facts.length * area * 3) }
}

function makeTrack({ width, data }: GreyPicture, x: number, y: number, into: Float32Array): Facts | null {
  let [mean, square] = [0, 0]
  each((i, j) => { mean += data[(y + j) * width + x + i]! / area })
  each((i, j) => { square += (data[(y + j) * width + x + i]! - mean) ** 2 })
  const length = Math.sqrt(square)
  if (length < 6 * side) return null
  let [xx, xy, yy, sumX, sumY, dotX, dotY] = [0, 0, 0, 0, 0, 0, 0]
  each((i, j, n) => {
    const at = (y + j) * width + x + i
    const v = (into[n] = (data[at]! - mean) / length)
    const gx = (into[n + 1] = (data[at + 1]! - data[at - 1]!) / 2 / length)
    const gy = (into[n + 2] = (data[at + width]! - data[at - width]!) / 2 / length)
    xx += gx * gx
    xy += gx * gy
    yy += gy * gy
    sumX += gx
    sumY += gy
    dotX += gx * v
    dotY += gy * v
  })
  const det = xx * yy - xy * xy
  if (det < 1e-3 * (xx + yy) ** 2) return null
  return { x, y, sumX, sumY, dotX, dotY, inverse: [yy / det, -xy / det, xx / det] }
}

function each(work: (i: number, j: number, n: number) => void): void {
  for (let j = -reach, n = 0; j <= reach; j++) for (let i = -reach; i <= reach; i++, n += 3) work(i, j, n)
}

/** What the last look at a leaf gave: light, its square, and products with the patch and its slopes. */
const seen = { sum: 0, square: 0, dot: 0, dotX: 0, dotY: 0 }

/**
 * Follows patches on a leaf from a near affine map (template -> leaf pixels, corner-based), each by itself, to a few hundredths of a pixel
 * (inverse-compositional, shift only; light and contrast do not matter). Pairs are in template pixels: where a patch is, and where it was found.
 */
export function follow(leaf: GreyPicture, { facts, values }: Tracks, near: Homography, furthest: number): Pair[] {
  const pairs: Pair[] = []
  facts.forEach((track, k) => {
    let [dx, dy, likeness] = [0, 0, 0]
    for (let step = 0; step < steps; step++) {
      likeness = 0
      if (!look(leaf, near, track.x + 0.5 + dx, track.y + 0.5 + dy, values, k * area * 3)) break
      const mean = seen.sum / area
      const length = Math.sqrt(Math.max(0, seen.square - seen.sum * mean))
      if (length < 3 * side) break
      const x = (seen.dotX - mean * track.sumX) / length - track.dotX
      const y = (seen.dotY - mean * track.sumY) / length - track.dotY
      const [a, b, c] = track.inverse
      const [mx, my] = [limited(a * x + b * y), limited(b * x + c * y)]
      dx -= mx
      dy -= my
      if (dx * dx + dy * dy > furthest * furthest) break
      likeness = seen.dot / length
      if (mx * mx + my * my < still * still) break
    }
    if (likeness >= alike) pairs.push({ x: track.x + 0.5, y: track.y + 0.5, u: track.x + 0.5 + dx, v: track.y + 0.5 + dy, weight: likeness })
  })
  return pairs
}

/** One step moves no further than the slopes hold. */
function limited(by: number): number {
  return Math.max(-1.5, Math.min(1.5, by))
}

/** Compares the patch round a template point with the leaf there, into `seen`; false when it lies beyond the edge. */
function look({ width, height, data }: GreyPicture, [[a, b, c], [d, e, f]]: Homography, x: number, y: number, values: Float32Array, from: number): boolean {
  const u0 = a * x + b * y + c - 0.5
  const v0 = d * x + e * y + f - 0.5
  const spanU = (Math.abs(a) + Math.abs(b)) * reach + 1
  const spanV = (Math.abs(d) + Math.abs(e)) * reach + 1
  if (u0 < spanU || v0 < spanV || u0 >= width - spanU - 1 || v0 >= height - spanV - 1) return false
  let [sum, square, dot, dotX, dotY] = [0, 0, 0, 0, 0]
  for (let j = -reach, n = from; j <= reach; j++) {
    let u = u0 - a * reach + b * j
    let v = v0 - d * reach + e * j
    for (let i = -reach; i <= reach; i++, n += 3, u += a, v += d) {
      const m = u | 0
      const k = v | 0
      const p = u - m
      const at = k * width + m
      const upper = data[at]! + (data[at + 1]! - data[at]!) * p
      const lower = data[at + width]! + (data[at + width + 1]! - data[at + width]!) * p
      const light = upper + (lower - upper) * (v - k)
      sum += light
      square += light * light
      dot += light * values[n]!
      dotX += light * values[n + 1]!
      dotY += light * values[n + 2]!
    }
  }
  seen.sum = sum
  seen.square = square
  seen.dot = dot
  seen.dotX = dotX
  seen.dotY = dotY
  return true
}
