import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Homography } from '@/lib/core/paper-space'
import { bestShift, uprightInk, type CoarsePlace } from './coarse'
import { fitAffine, type Pair } from './fit-affine'

const columns = 4
const rows = 6
/** How far a block may lie off the coarse place, in pixels of 25 dpi: scale and skew errors at the page's edge. */
const reach = 5
const likeEnough = 0.35

/**
 * Betters a coarse place by looking for the page's parts one by one at 25 dpi and fitting one affine map through them, which takes up
 * scale, aspect and skew. Maps template to leaf pixels, both of 100 dpi. `likeness` is the mean over parts that hold print.
 */
export function blockFit(ink: GreyPicture, template: GreyPicture, place: CoarsePlace): { map: Homography; likeness: number } {
  const width = template.width + 2 * reach
  const height = template.height + 2 * reach
  const canvas = uprightInk(ink, place.degrees, width, height, place.dx * 2, place.dy * 2)
  const pairs: Pair[] = []
  let likeness = 0
  let blocks = 0
  for (let row = 0; row < rows; row++)
    for (let column = 0; column < columns; column++) {
      const block = cut(template, column, row)
      if (!block) continue
      const { x, y, picture } = block
      const part = region(canvas, width, x, y, picture.width + 2 * reach, picture.height + 2 * reach)
      const found = bestShift(part, picture, { x: reach, y: reach })
      blocks++
      likeness += Math.max(0, found.likeness)
      if (found.likeness < likeEnough) continue
      const [cx, cy] = [x + picture.width / 2, y + picture.height / 2]
      pairs.push({ x: cx, y: cy, u: cx + found.dx, v: cy + found.dy, weight: found.likeness })
    }
  const bend = fitAffine(pairs, 1.2)
  return { map: toLeaf(bend, ink, template, place), likeness: blocks ? likeness / blocks : 0 }
}

/** A block of the template, when enough is printed in it. */
function cut(template: GreyPicture, column: number, row: number): { x: number; y: number; picture: GreyPicture } | null {
  const w = Math.floor(template.width / columns)
  const h = Math.floor(template.height / rows)
  const data = new Uint8Array(w * h)
  let ink = 0
  for (let y = 0, k = 0; y < h; y++) for (let x = 0; x < w; x++, k++) ink += data[k] = template.data[(row * h + y) * template.width + column * w + x]!
  return ink < 12 * 255 ? null : { x: column * w, y: row * h, picture: { width: w, height: h, data } }
}

function region(canvas: Float32Array, stride: number, x: number, y: number, w: number, h: number): Float32Array {
  const out = new Float32Array(w * h)
  for (let row = 0; row < h; row++) out.set(canvas.subarray((y + row) * stride + x, (y + row) * stride + x + w), row * w)
  return out
}

/** Template -> bent template (25 dpi) -> turned and shifted onto the leaf, in pixels of 100 dpi on both sides. */
function toLeaf([a, b, c, d, e, f]: readonly number[], ink: GreyPicture, template: GreyPicture, place: CoarsePlace): Homography {
  const angle = (place.degrees * Math.PI) / 180
  const [cos, sin] = [Math.cos(angle), Math.sin(angle)]
  const x = [a!, c!, e! + place.dx * 2 - template.width / 2]
  const y = [b!, d!, f! + place.dy * 2 - template.height / 2]
  const u = [0, 1, 2].map((k) => cos * x[k]! - sin * y[k]!)
  const v = [0, 1, 2].map((k) => sin * x[k]! + cos * y[k]!)
  return [[u[0]!, u[1]!, (u[2]! + ink.width / 2) * 4], [v[0]!, v[1]!, (v[2]! + ink.height / 2) * 4], [0, 0, 1]]
}
