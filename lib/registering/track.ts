import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Homography } from '@/lib/core/paper-space'
import type { Pair } from './fit-affine'

/** Half the side of a tracked patch, in pixels. */
const reach = 7
const side = 2 * reach + 1
const steps = 10
const still = 0.02
/** A patch that ends up less alike than this was not found. */
const alike = 0.5

/** A patch of print made ready for being followed: mean 0, length 1, with its slopes and their inverse normal matrix. Middle in pixel indices. */
export type Track = Readonly<{ x: number; y: number; patch: Float32Array; slopeX: Float32Array; slopeY: Float32Array; inverse: readonly [number, number, number] }>

/** Makes tracks of the patches round points (pixel indices x, y, x, y ...); those too plain or too near the edge to be followed fall out. */
export function makeTracks({ width, height, data }: GreyPicture, points: ArrayLike<number>): Track[] {
  const tracks: Track[] = []
  for (let k = 0; k < points.length; k += 2) {
    const [x, y] = [Math.round(points[k]!), Math.round(points[k + 1]!)]
    if (x <= reach || y <= reach || x >= width - reach - 1 || y >= height - reach - 1) continue
    const values = { patch: new Float32Array(side * side), slopeX: new Float32Array(side * side), slopeY: new Float32Array(side * side) }
    for (let j = -reach, n = 0; j <= reach; j++)
      for (let i = -reach; i <= reach; i++, n++) {
        const at = (y + j) * width + x + i
        values.patch[n] = data[at]!
        values.slopeX[n] = (data[at + 1]! - data[at - 1]!) / 2
        values.slopeY[n] = (data[at + width]! - data[at - width]!) / 2
      }
    const length = centre(values.patch)
    if (length < 6 * side) continue
    let [xx, xy, yy] = [0, 0, 0]
    for (let n = 0; n < side * side; n++) {
      const gx = (values.slopeX[n]! /= length)
      const gy = (values.slopeY[n]! /= length)
      xx += gx * gx
      xy += gx * gy
      yy += gy * gy
    }
    const det = xx * yy - xy * xy
    if (det < 1e-3 * (xx + yy) ** 2) continue
    tracks.push({ x, y, ...values, inverse: [yy / det, -xy / det, xx / det] })
  }
  return tracks
}

/** Brings values to mean 0 and length 1; gives the length they had. */
function centre(values: Float32Array): number {
  let sum = 0
  for (const v of values) sum += v
  const mean = sum / values.length
  let square = 0
  for (let n = 0; n < values.length; n++) square += (values[n]! -= mean) ** 2
  const length = Math.sqrt(square)
  if (length > 0) for (let n = 0; n < values.length; n++) values[n]! /= length
  return length
}

/**
 * Follows patches on a leaf from a near affine map (template -> leaf pixels, corner-based), each by itself, to a few hundredths of a pixel
 * (inverse-compositional, shift only; light and contrast do not matter). Pairs are in template pixels: where a patch is, and where it was found.
 */
export function follow(leaf: GreyPicture, tracks: readonly Track[], near: Homography, furthest: number): Pair[] {
  const pairs: Pair[] = []
  const seen = new Float32Array(side * side)
  for (const track of tracks) {
    let [dx, dy, likeness] = [0, 0, 0]
    for (let step = 0; step < steps; step++) {
      if (!sample(leaf, near, track.x + 0.5 + dx, track.y + 0.5 + dy, seen) || centre(seen) < 3 * side) {
        likeness = 0
        break
      }
      let [x, y] = [0, 0]
      likeness = 0
      for (let n = 0; n < seen.length; n++) {
        const error = seen[n]! - track.patch[n]!
        x += track.slopeX[n]! * error
        y += track.slopeY[n]! * error
        likeness += seen[n]! * track.patch[n]!
      }
      const [a, b, c] = track.inverse
      const [mx, my] = [limited(a * x + b * y), limited(b * x + c * y)]
      dx -= mx
      dy -= my
      if (Math.hypot(dx, dy) > furthest) {
        likeness = 0
        break
      }
      if (Math.hypot(mx, my) < still) break
    }
    if (likeness >= alike) pairs.push({ x: track.x + 0.5, y: track.y + 0.5, u: track.x + 0.5 + dx, v: track.y + 0.5 + dy, weight: likeness })
  }
  return pairs
}

/** One step moves no further than the slopes hold. */
function limited(by: number): number {
  return Math.max(-1.5, Math.min(1.5, by))
}

/** Takes the patch round a template point off the leaf; false when it lies beyond the edge. */
function sample({ width, height, data }: GreyPicture, [[a, b, c], [d, e, f]]: Homography, x: number, y: number, into: Float32Array): boolean {
  const u0 = a * x + b * y + c - 0.5
  const v0 = d * x + e * y + f - 0.5
  const spanU = (Math.abs(a) + Math.abs(b)) * reach + 1
  const spanV = (Math.abs(d) + Math.abs(e)) * reach + 1
  if (u0 < spanU || v0 < spanV || u0 >= width - spanU - 1 || v0 >= height - spanV - 1) return false
  for (let j = -reach, n = 0; j <= reach; j++) {
    let u = u0 - a * reach + b * j
    let v = v0 - d * reach + e * j
    for (let i = -reach; i <= reach; i++, n++, u += a, v += d) {
      const [m, k] = [u | 0, v | 0]
      const [p, q] = [u - m, v - k]
      const at = k * width + m
      into[n] = (data[at]! * (1 - p) + data[at + 1]! * p) * (1 - q) + (data[at + width]! * (1 - p) + data[at + width + 1]! * p) * q
    }
  }
  return true
}
