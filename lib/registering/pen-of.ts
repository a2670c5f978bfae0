import type { GreyPicture } from '@/lib/core/grey-picture'
import type { PenTrace } from '@/lib/core/leaf'
import type { Homography } from '@/lib/core/paper-space'
import { HandCounter } from './hand-counter'
import type { Template } from './template'

const dark = 165
/** Near the page's edge lie the lid, holes and staples: 10 mm, in pixels of 100 dpi. */
const margin = 40
/** Fewer strokes than this say nothing about a pen. */
const fewest = 300

/**
 * How a page's writing looks, whatever it says: how dark its strokes are in the middle, and how wide (dark pixels for each crossing of
 * an edge, at 100 dpi). Pencil, ink and pressure differ from student to student more than from page to page.
 */
export function penOf(leaf: GreyPicture, template: Template, [[a, b, c], [d, e, f], [g, h, i]]: Homography): PenTrace | null {
  const { width, height } = template.white
  const cores = new Uint32Array(256)
  const hand = new HandCounter()
  const line = new Uint8Array(width).fill(255)
  let [dots, crossings, strokes] = [0, 0, 0]
  for (let y = margin; y < height - margin; y++) {
    let before = 255
    let darkest = 255
    for (let x = margin; x < width - margin; x++) {
      const w = g * x + h * y + i
      const u = ((a * x + b * y + c) / w) | 0
      const v = ((d * x + e * y + f) / w) | 0
      const free = template.clear[y * width + x] === 1 && u >= 0 && v >= 0 && u < leaf.width && v < leaf.height
      const value = free ? leaf.data[v * leaf.width + u]! : 255
      line[x] = value
      if (value < dark) {
        dots++
        darkest = Math.min(darkest, value)
        if (before >= dark) crossings++
      } else if (before < dark) {
        cores[darkest]!++
        strokes++
        darkest = 255
      }
      before = value
    }
    hand.add(line, y)
  }
  if (strokes < fewest) return null
  let left = strokes / 2
  let core = 0
  while (core < 255 && (left -= cores[core]!) > 0) core++
  return { core, width: dots / crossings, ...hand.result() }
}
