import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Homography } from '@/lib/core/paper-space'

/** Half the side of a window in which two pages are compared, in pixels of 100 dpi: a printed digit and its surroundings. */
const reach = 7
const side = 2 * reach + 1
/** Windows that differ by less than this in the mean, of 255, are alike. */
const least = 7
const most = 30
/** So much a single window may be off by chance: dust, or a pen stroke across it. */
const chance = 0.7

/** Two pages differ round here (middle in pixels of 100 dpi). `alike` is the correlation of the two there, null where one is plain paper. */
type Window = Readonly<{ x: number; y: number; alike: number | null }>
const kept = new WeakMap<GreyPicture, WeakMap<GreyPicture, readonly Window[]>>()

/**
 * By how much more a leaf looks like page `one` than like page `other` where the two differ at all, from -1 to 1, less what chance may do: for pages that
 * are told apart by a few printed digits. `map` takes pixels of the page to those of the levelled leaf, both of 100 dpi. Null when they differ nowhere.
 */
export function tellApart(leaf: GreyPicture, one: GreyPicture, other: GreyPicture, map: Homography, otherMap: Homography): number | null {
  const windows = differing(one, other)
  if (windows.length === 0) return null
  const sum = windows.reduce((total, window) => total + leaning(leaf, one, other, map, otherMap, window), 0)
  return sum / windows.length - chance / Math.sqrt(windows.length)
}

function leaning(leaf: GreyPicture, one: GreyPicture, other: GreyPicture, map: Homography, otherMap: Homography, { x, y, alike }: Window): number {
  const [mine, theirs] = [likeness(leaf, map, one, x, y), likeness(leaf, otherMap, other, x, y)]
  // Where one page is plain, its paper has nothing to be alike: the other's print is there or is not.
  const by = alike === null ? (mine === null ? 1 - 2 * (theirs ?? 0) : 2 * mine - 1) : ((mine ?? 0) - (theirs ?? 0)) / (1 - alike)
  return Math.max(-1, Math.min(1, by))
}

/** Windows in which two pages differ most, none upon another. */
function differing(one: GreyPicture, other: GreyPicture): readonly Window[] {
  const there = kept.get(one)?.get(other)
  if (there) return there
  const found: (Window & { difference: number })[] = []
  const [width, height] = [Math.min(one.width, other.width), Math.min(one.height, other.height)]
  for (let y = reach; y < height - reach; y += 4)
    for (let x = reach; x < width - reach; x += 4) {
      const difference = differenceAt(one, other, x, y)
      if (difference >= least) found.push({ x, y, difference, alike: null })
    }
  found.sort((a, b) => b.difference - a.difference)
  const chosen: Window[] = []
  for (const { x, y } of found) {
    if (chosen.length === most) break
    if (chosen.some((window) => Math.abs(window.x - x) < side && Math.abs(window.y - y) < side)) continue
    const [a, b] = [patch(one, null, x, y), patch(other, null, x, y)]
    const alike = a && b ? dot(a, b) : null
    if (alike === null || alike < 0.95) chosen.push({ x, y, alike })
  }
  const of = kept.get(one) ?? new WeakMap<GreyPicture, readonly Window[]>()
  kept.set(one, of.set(other, chosen))
  return chosen
}

function differenceAt(one: GreyPicture, other: GreyPicture, x: number, y: number): number {
  let sum = 0
  for (let j = -reach; j <= reach; j++)
    for (let i = -reach; i <= reach; i++) sum += Math.abs(one.data[(y + j) * one.width + x + i]! - other.data[(y + j) * other.width + x + i]!)
  return sum / (side * side)
}

/** How much a leaf looks like a page round a place; null where the page is plain there. */
function likeness(leaf: GreyPicture, map: Homography, page: GreyPicture, x: number, y: number): number | null {
  const own = patch(page, null, x, y)
  if (!own) return null
  const seen = patch(leaf, map, x, y)
  return seen ? Math.max(0, dot(own, seen)) : 0
}

function dot(a: Float32Array, b: Float32Array): number {
  let sum = 0
  for (let k = 0; k < a.length; k++) sum += a[k]! * b[k]!
  return sum
}

/** A picture round a place, by a map or straight, with mean 0 and length 1; null when nothing is to be seen there. */
function patch({ width, height, data }: GreyPicture, map: Homography | null, x: number, y: number): Float32Array | null {
  const out = new Float32Array(side * side)
  let [sum, square] = [0, 0]
  for (let j = -reach, k = 0; j <= reach; j++)
    for (let i = -reach; i <= reach; i++, k++) {
      const value = map ? bilinear(data, width, height, map, x + i + 0.5, y + j + 0.5) : data[(y + j) * width + x + i]!
      out[k] = value
      sum += value
      square += value * value
    }
  const mean = sum / out.length
  const length = Math.sqrt(square - sum * mean)
  return length < 8 * side ? null : out.map((value) => (value - mean) / length)
}

function bilinear(data: Uint8Array, width: number, height: number, [[a, b, c], [d, e, f], [g, h, i]]: Homography, x: number, y: number): number {
  const w = g * x + h * y + i
  const u = (a * x + b * y + c) / w - 0.5
  const v = (d * x + e * y + f) / w - 0.5
  const [m, n] = [Math.floor(u), Math.floor(v)]
  if (m < 0 || n < 0 || m + 1 >= width || n + 1 >= height) return 255
  const [p, q] = [u - m, v - n]
  const at = n * width + m
  return (data[at]! * (1 - p) + data[at + 1]! * p) * (1 - q) + (data[at + width]! * (1 - p) + data[at + width + 1]! * p) * q
}
