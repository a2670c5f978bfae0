import { deflateRawSync } from 'node:zlib'
import type { GreyPicture } from '@/lib/core/grey-picture'
import { inkCellPoints, type InkMap } from '@/lib/core/leaf'
import type { Homography } from '@/lib/core/paper-space'
import type { Template } from './template'

const dark = 165
const plain = 225
/** Near the page's edge lie the lid, holes and staples: 10 mm, in pixels of 100 dpi. */
const margin = 40
/** Every second pixel is looked at. */
const step = 2

/**
 * What was written on a page: dark on the levelled leaf where the blank page has no print within a millimetre, gathered in
 * squares of 2 mm. `map` takes template to leaf pixels (100 dpi).
 */
export function inkMap(leaf: GreyPicture, template: Template, [[a, b, c], [d, e, f], [g, h, i]]: Homography): InkMap {
  const { width, height } = template.white
  const cell = (inkCellPoints * 100) / 72
  const columns = Math.ceil(width / cell)
  const counts = new Uint16Array(columns * Math.ceil(height / cell))
  for (let y = margin; y < height - margin; y += step) {
    const row = Math.floor(y / cell) * columns
    for (let x = margin; x < width - margin; x += step) {
      if (template.clear[y * width + x] === 0) continue
      const w = g * x + h * y + i
      const u = ((a * x + b * y + c) / w) | 0
      const v = ((d * x + e * y + f) / w) | 0
      if (u < 0 || v < 0 || u >= leaf.width || v >= leaf.height) continue
      if (leaf.data[v * leaf.width + u]! < dark) counts[row + Math.floor(x / cell)]!++
    }
  }
  const most = (cell / step) ** 2
  return deflateRawSync(Uint8Array.from(counts, (n) => Math.min(240, Math.round((n * 32) / most) * 16))).toString('base64')
}

/** Marks (1) where a levelled blank page has no print within so many pixels. */
export function clearOfPrint({ width, height, data }: GreyPicture, reach = 4): Uint8Array {
  const across = spread(data, width, height, 1, width, reach, (v) => v < plain)
  const both = spread(across, height, width, width, 1, reach, (v) => v === 1)
  return both.map((v) => 1 - v)
}

/** 1 where `hit` holds within so many steps along a line. */
function spread(data: Uint8Array, length: number, lines: number, along: number, between: number, reach: number, hit: (v: number) => boolean): Uint8Array {
  const out = new Uint8Array(data.length)
  for (let line = 0; line < lines; line++)
    for (let k = 0, until = -1; k < length + reach; k++) {
      if (k < length && hit(data[line * between + k * along]!)) until = k + 2 * reach
      if (k >= reach && k <= until) out[line * between + (k - reach) * along] = 1
    }
  return out
}
