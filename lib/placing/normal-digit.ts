import type { GreyPicture } from '@/lib/core/grey-picture'
import { side } from './digit-net'

/** A digit fits into this many pixels of the network's picture, as in the data set it learnt from. */
const fitted = 20

/** Where strokes are, as marks (1) on the picture, with their box. */
export type Strokes = Readonly<{ kept: Uint8Array; left: number; top: number; right: number; bottom: number }>

/**
 * The digit in a picture of ink (0 none, 255 full), as the network wants it: fitted to 20 pixels, its mass in the middle, its ink
 * between 0 and 1.
 */
export function normalDigit({ width, data }: GreyPicture, { kept, left, top, right, bottom }: Strokes): Float32Array {
  const most = Math.max(right - left + 1, bottom - top + 1)
  const step = most / fitted
  const full = fullInk(data, kept)
  let [sum, sx, sy] = [0, 0, 0]
  for (let y = top; y <= bottom; y++)
    for (let x = left; x <= right; x++) {
      const at = y * width + x
      const v = kept[at] ? data[at]! : 0
      sum += v
      sx += v * x
      sy += v * y
    }
  const originX = sx / sum + 0.5 - (step * side) / 2
  const originY = sy / sum + 0.5 - (step * side) / 2
  const out = new Float32Array(side * side)
  for (let y = top; y <= bottom; y++) {
    const v = (y - originY) / step
    for (let x = left; x <= right; x++) {
      const at = y * width + x
      if (kept[at]) spill(out, (x - originX) / step, v, 1 / step, Math.min(1, data[at]! / full))
    }
  }
  return out
}

/** Spreads one source pixel over the pixels it covers; pixels finer than the picture's are repeated by their size. */
function spill(out: Float32Array, u: number, v: number, size: number, ink: number): void {
  for (let y = Math.floor(v); y < v + size; y++) {
    if (y < 0 || y >= side) continue
    const high = Math.min(y + 1, v + size) - Math.max(y, v)
    for (let x = Math.floor(u); x < u + size; x++) {
      if (x < 0 || x >= side) continue
      const wide = Math.min(x + 1, u + size) - Math.max(x, u)
      out[y * side + x] = Math.min(1, out[y * side + x]! + ink * wide * high)
    }
  }
}

/** How dark the strokes are where they are dark, so that pencil counts like ink. */
function fullInk(data: Uint8Array, kept: Uint8Array): number {
  const counts = new Uint32Array(256)
  let all = 0
  for (let k = 0; k < data.length; k++)
    if (kept[k]) {
      counts[data[k]!]!++
      all++
    }
  let left = all * 0.3
  let level = 255
  while (level > 1 && (left -= counts[level]!) > 0) level--
  return level
}
