import type { Turn } from '@/lib/core/paper-space'
import { chain, undo, type Affine } from './affine'

/** The shown part of a page in its own user space (y up), its /Rotate, and how many points a unit of that space is (1 where it says nothing). */
export type PageBox = Readonly<{ left: number; bottom: number; width: number; height: number; turn: Turn; unit?: number }>
/** The stored image's frame: its pixels, their density on the page, how the page shows it, and user space -> pixels. */
export type StoredFrame = Readonly<{ width: number; height: number; dpiX: number; dpiY: number; shownTurn: Turn; toPixels: Affine }>

const coversPage = 0.9
const mostBeyond = 1.3

/** The frame of an image laid on the page by `matrix` (its unit square in user space); null for mirrored or slanted ones. */
export function imageFrame(box: PageBox, matrix: Affine, width: number, height: number): StoredFrame | null {
  const [a, b, c, d] = matrix
  const back = undo(matrix)
  const { unit = 1 } = box
  const along = Math.hypot(a, b) * unit
  const down = Math.hypot(c, d) * unit
  if (!back || a * d - b * c <= 0 || Math.abs(a * c + b * d) * unit * unit > 0.02 * along * down) return null
  const quarter = Math.round((Math.atan2(b, a) * 2) / Math.PI)
  const shownTurn = ((((box.turn / 90 - quarter) % 4) + 4) % 4) * 90
  return {
    width, height, dpiX: (72 * width) / along, dpiY: (72 * height) / down, shownTurn: shownTurn as Turn,
    toPixels: chain(back, [width, 0, 0, -height, 0, height]),
  }
}

/** The frame of a page drawn as a whole: before its /Rotate, at so many dots per inch. */
export function pageFrame(box: PageBox, dpi: number): StoredFrame {
  const k = (dpi * (box.unit ?? 1)) / 72
  return {
    width: Math.max(1, Math.round(box.width * k)), height: Math.max(1, Math.round(box.height * k)), dpiX: dpi, dpiY: dpi, shownTurn: box.turn,
    toPixels: [k, 0, 0, -k, -box.left * k, (box.bottom + box.height) * k],
  }
}

/** Whether an image laid by `matrix` takes up nearly the whole page and hardly more: where a box shows a part of a larger picture, the rest is another page's. */
export function covers(box: PageBox, [a, b, c, d, e, f]: Affine): boolean {
  const left = e + Math.min(0, a) + Math.min(0, c)
  const bottom = f + Math.min(0, b) + Math.min(0, d)
  const wide = Math.abs(a) + Math.abs(c)
  const high = Math.abs(b) + Math.abs(d)
  const shown = overlap(left, left + wide, box.left, box.left + box.width) * overlap(bottom, bottom + high, box.bottom, box.bottom + box.height)
  return shown >= coversPage * box.width * box.height && wide * high <= mostBeyond * box.width * box.height
}
function overlap(from: number, to: number, low: number, high: number): number {
  return Math.max(0, Math.min(to, high) - Math.max(from, low))
}
