import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Strokes } from './normal-digit'

/** Ink weaker than this is paper, whatever the rest looks like; of 255. */
const faintest = 36
/** Strokes shorter than this, in both directions, are no digit: 1.3 mm at 200 dpi. */
const shortest = 10
/** A part with less ink than this share of the largest is a speck. */
const speck = 0.04

type Part = { size: number; left: number; top: number; right: number; bottom: number; label: number }

/**
 * The strokes of one digit on a picture of ink (0 none, 255 full, 200 dpi): the parts that hang together, without specks, and without
 * what lies outside `frame` (the box) for its larger part: that is a neighbour's or the box's own line. Null when nothing is written.
 */
export function findStrokes(ink: GreyPicture, frame: Readonly<{ left: number; top: number; right: number; bottom: number }>): Strokes | null {
  const { width, height, data } = ink
  const least = threshold(data)
  const { parts, labels } = partsOf(ink, least)
  const middle = (part: Part) => ({ x: (part.left + part.right) / 2, y: (part.top + part.bottom) / 2 })
  const inside = parts.filter((part) => {
    const { x, y } = middle(part)
    return x >= frame.left && x <= frame.right && y >= frame.top && y <= frame.bottom
  })
  const largest = inside.reduce<Part | null>((a, b) => (a && a.size >= b.size ? a : b), null)
  if (!largest) return null
  const own = inside.filter((part) => part.size >= speck * largest.size && (part === largest || !isRim(part, frame)))
  const box = {
    left: Math.min(...own.map((p) => p.left)), top: Math.min(...own.map((p) => p.top)),
    right: Math.max(...own.map((p) => p.right)), bottom: Math.max(...own.map((p) => p.bottom)),
  }
  if (Math.max(box.right - box.left, box.bottom - box.top) < shortest) return null
  const keep = new Set(own.map(({ label }) => label))
  const kept = new Uint8Array(width * height)
  for (let k = 0; k < kept.length; k++) kept[k] = keep.has(labels[k]!) ? 1 : 0
  return { kept, ...box }
}

/** A thin part along the box's edge: what is left of its line. */
function isRim({ left, top, right, bottom }: Part, frame: Readonly<{ left: number; top: number; right: number; bottom: number }>): boolean {
  const near = 4
  return right < frame.left + near || left > frame.right - near || bottom < frame.top + near || top > frame.bottom - near
}

/** A third of the darkest ink there is (not counting the darkest few pixels). */
function threshold(data: Uint8Array): number {
  const counts = new Uint32Array(256)
  for (const v of data) counts[v]!++
  let left = Math.max(12, data.length * 0.004)
  let level = 255
  while (level > 1 && (left -= counts[level]!) > 0) level--
  return Math.max(faintest, level * 0.34)
}

/** Labels the parts that hang together (corners count, as do gaps of one pixel). */
function partsOf({ width, height, data }: GreyPicture, least: number): { parts: Part[]; labels: Int32Array } {
  const labels = new Int32Array(width * height)
  const parts: Part[] = []
  const stack: number[] = []
  for (let start = 0; start < labels.length; start++) {
    if (labels[start] !== 0 || data[start]! < least) continue
    const part: Part = { size: 0, left: width, top: height, right: 0, bottom: 0, label: parts.length + 1 }
    labels[start] = part.label
    stack.push(start)
    while (stack.length) {
      const at = stack.pop()!
      const x = at % width
      const y = (at - x) / width
      part.size++
      part.left = Math.min(part.left, x)
      part.right = Math.max(part.right, x)
      part.top = Math.min(part.top, y)
      part.bottom = Math.max(part.bottom, y)
      for (let j = -2; j <= 2; j++)
        for (let i = -2; i <= 2; i++) {
          if (x + i < 0 || x + i >= width || y + j < 0 || y + j >= height) continue
          const near = at + j * width + i
          if (labels[near] !== 0 || data[near]! < least) continue
          labels[near] = part.label
          stack.push(near)
        }
    }
    parts.push(part)
  }
  return { parts, labels }
}
