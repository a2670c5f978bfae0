import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Homography } from '@/lib/core/paper-space'
import { patchReach, type Template } from './template'

/** A patch of print counts as found from this correlation on. */
const foundFrom = 0.6
const side = 2 * patchReach + 1

/**
 * How well each of a template's patches of print is there on the leaf, by correlation (-1..1), under a map from template to
 * leaf pixels. Correlation looks at shape alone, so it means the same on grey, colour and 1-bit scans, light or dark.
 */
export function printFound(leaf: GreyPicture, template: Template, map: Homography): Float32Array {
  const out = new Float32Array(template.patches.length)
  const patch = new Float32Array(side * side)
  for (let k = 0; k < out.length; k++) {
    sample(leaf, map, Math.round(template.corners[k * 2]!), Math.round(template.corners[k * 2 + 1]!), patch)
    out[k] = correlation(patch, template.patches[k]!)
  }
  return out
}

/** Share of the chosen patches (all of them by default) that were found. */
export function shareFound(found: Float32Array, chosen?: readonly number[]): number {
  let hits = 0
  if (!chosen) for (const v of found) hits += v >= foundFrom ? 1 : 0
  else for (const k of chosen) hits += found[k]! >= foundFrom ? 1 : 0
  return hits / Math.max(1, chosen ? chosen.length : found.length)
}

function sample({ width, height, data }: GreyPicture, [[a, b, c], [d, e, f], [g, h, i]]: Homography, cx: number, cy: number, patch: Float32Array): void {
  for (let j = -patchReach, k = 0; j <= patchReach; j++)
    for (let l = -patchReach; l <= patchReach; l++, k++) {
      const x = cx + l + 0.5
      const y = cy + j + 0.5
      const w = g * x + h * y + i
      const u = (a * x + b * y + c) / w - 0.5
      const v = (d * x + e * y + f) / w - 0.5
      const [m, n] = [Math.floor(u), Math.floor(v)]
      if (!(m >= 0 && n >= 0 && m + 1 < width && n + 1 < height)) {
        patch[k] = 255
        continue
      }
      const [p, q] = [u - m, v - n]
      const at = n * width + m
      patch[k] = (data[at]! * (1 - p) + data[at + 1]! * p) * (1 - q) + (data[at + width]! * (1 - p) + data[at + width + 1]! * p) * q
    }
}

/** `normalised` has mean 0 and length 1. */
function correlation(patch: Float32Array, normalised: Float32Array): number {
  let [sum, square, dot] = [0, 0, 0]
  for (let k = 0; k < patch.length; k++) {
    const v = patch[k]!
    sum += v
    square += v * v
    dot += v * normalised[k]!
  }
  const spread = square - (sum * sum) / patch.length
  return spread < 36 * patch.length ? 0 : dot / Math.sqrt(spread)
}
