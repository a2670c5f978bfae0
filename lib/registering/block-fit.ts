import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Homography } from '@/lib/core/paper-space'
import { bestShift, inkedPart, type Inked } from './best-shift'
import type { CoarsePlace } from './coarse'
import { fitAffine, type Pair } from './fit-affine'
import type { Memory } from './memory'
import { upright } from './upright'

const columns = 4
const rows = 6
/** How far a block may lie off the coarse place, in pixels of 25 dpi: scale and skew errors at the page's edge. */
const reach = 5
const likeEnough = 0.35
const leastInk = 12 * 255

/** A part of a blank page at 25 dpi in which enough is printed. */
export type Block = Readonly<{ x: number; y: number; piece: Inked }>

/** The parts of a blank page's ink (25 dpi) that can be looked for one by one. */
export function blocksOf(ink: GreyPicture): Block[] {
  const width = Math.floor(ink.width / columns)
  const height = Math.floor(ink.height / rows)
  const blocks = Array.from({ length: columns * rows }, (_, k) => {
    const [x, y] = [(k % columns) * width, Math.floor(k / columns) * height]
    return { x, y, piece: inkedPart(ink, x, y, width, height) }
  })
  return blocks.filter(({ piece }) => piece.mean * width * height >= leastInk)
}

/**
 * Betters a coarse place by looking for the page's parts one by one at 25 dpi and fitting one affine map through them, which takes up
 * scale, aspect and skew. Maps template to leaf pixels, both of 100 dpi.
 */
export function blockFit(ink: GreyPicture, template: GreyPicture, blocks: readonly Block[], place: CoarsePlace, memory: Memory): Homography {
  const canvas = upright(ink, place.degrees, template.width + 2 * reach, template.height + 2 * reach, memory, 'blocks', place.dx * 2, place.dy * 2)
  const pairs: Pair[] = []
  for (const { x, y, piece } of blocks) {
    const found = bestShift(canvas, piece, { x: reach, y: reach }, x, y)
    if (found.likeness < likeEnough) continue
    const [cx, cy] = [x + piece.width / 2, y + piece.height / 2]
    pairs.push({ x: cx, y: cy, u: cx + found.dx, v: cy + found.dy, weight: found.likeness })
  }
  return toLeaf(fitAffine(pairs, 1.2), ink, template, place)
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
