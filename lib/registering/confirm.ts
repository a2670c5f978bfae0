import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Homography } from '@/lib/core/paper-space'
import { patchReach, type Template } from './template'

/** A patch of print counts as found from this correlation on. */
const foundFrom = 0.6

/**
 * How well each of a template's patches of print is there on the leaf, by correlation (-1..1), under a map from template to
 * leaf pixels. Correlation looks at shape alone, so it means the same on grey, colour and 1-bit scans, light or dark.
 */
export function printFound(leaf: GreyPicture, template: Template, map: Homography): Float32Array {
  const out = new Float32Array(template.patches.length)
  for (let k = 0; k < out.length; k++) out[k] = likeness(leaf, map, Math.round(template.corners[k * 2]!), Math.round(template.corners[k * 2 + 1]!), template.patches[k]!)
  return out
}

/** Share of the chosen patches (all of them by default) that were found. */
export function shareFound(found: Float32Array, chosen?: readonly number[]): number {
  let hits = 0
  if (!chosen) for (const v of found) hits += v >= foundFrom ? 1 : 0
  else for (const k of chosen) hits += found[k]! >= foundFrom ? 1 : 0
  return hits / Math.max(1, chosen ? chosen.length : found.length)
}

/** Correlation of a patch (mean 0, length 1) with the leaf where the map puts it; over so small a piece the map is taken to be even. */
function likeness({ width, height, data }: GreyPicture, [[a, b, c], [d, e, f], [g, h, i]]: Homography, cx: number, cy: number, patch: Float32Array): number {
  const [x, y] = [cx + 0.5, cy + 0.5]
  const w = g * x + h * y + i
  const [u0, v0] = [(a * x + b * y + c) / w, (d * x + e * y + f) / w]
  const [ux, uy, vx, vy] = [(a - u0 * g) / w, (b - u0 * h) / w, (d - v0 * g) / w, (e - v0 * h) / w]
  let [sum, square, dot] = [0, 0, 0]
  for (let j = -patchReach, k = 0; j <= patchReach; j++) {
    let u = u0 - 0.5 - patchReach * ux + j * uy
    let v = v0 - 0.5 - patchReach * vx + j * vy
    for (let l = -patchReach; l <= patchReach; l++, k++, u += ux, v += vx) {
      const light = u >= 0 && v >= 0 && u + 1 < width && v + 1 < height ? lightAt(data, width, u, v) : 255
      sum += light
      square += light * light
      dot += light * patch[k]!
    }
  }
  const spread = square - (sum * sum) / patch.length
  return spread < 36 * patch.length ? 0 : dot / Math.sqrt(spread)
}

function lightAt(data: Uint8Array, width: number, u: number, v: number): number {
  const m = u | 0
  const n = v | 0
  const p = u - m
  const at = n * width + m
  const upper = data[at]! + (data[at + 1]! - data[at]!) * p
  const lower = data[at + width]! + (data[at + width + 1]! - data[at + width]!) * p
  return upper + (lower - upper) * (v - n)
}
