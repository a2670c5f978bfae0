import { templateDpi, type BlankPage, type GreyPicture } from '@/lib/core/grey-picture'
import type { Homography, PaperRect } from '@/lib/core/paper-space'

/** Pixels for each paper point: 200 dpi, whatever the scan's density. */
const density = 200 / 72
/** Room round a box, in points (1.5 mm): digits do not always stay inside. */
const room = 4.25
/** Darker than this the blank page is print: what a scan shows within a quarter of a millimetre of it is not written. */
const printed = 200

/** What was written in a box and round it: ink 0 to 255 without the paper's own print, and where the box itself is on it. */
export type BoxInk = Readonly<{ ink: GreyPicture; frame: Readonly<{ left: number; top: number; right: number; bottom: number }> }>

/** Takes a box out of a leaf's stored image (`homography`: paper points to its pixels), upright, and the blank page's print off it. */
export function boxInk(leaf: GreyPicture, homography: Homography, blank: BlankPage, box: PaperRect): BoxInk {
  const width = Math.round((box.w + 2 * room) * density)
  const height = Math.round((box.h + 2 * room) * density)
  const [left, top] = [box.x - room + 0.5 / density, box.y - room + 0.5 / density]
  const grey = resampled(leaf, homography, left, top, width, height)
  const print = printOf(blank, left, top, width, height)
  const paper = Math.max(1, paperTone(grey))
  const data = grey.map((v, k) => (print[k] === 1 || v > paper ? 0 : ((paper - v) * 255) / paper))
  const edge = Math.round(room * density)
  return { ink: { width, height, data }, frame: { left: edge, top: edge, right: width - 1 - edge, bottom: height - 1 - edge } }
}

/** A part of the page at 200 dpi, from its first pixel's centre (paper points), between the pixels' centres of the leaf; white beyond it. */
function resampled({ width, height, data }: GreyPicture, [[a, b, c], [d, e, f], [g, h, i]]: Homography, left: number, top: number, wide: number, high: number): Uint8Array {
  const out = new Uint8Array(wide * high).fill(255)
  for (let row = 0, k = 0; row < high; row++) {
    const y = top + row / density
    for (let column = 0; column < wide; column++, k++) {
      const x = left + column / density
      const w = g * x + h * y + i
      const u = (a * x + b * y + c) / w - 0.5
      const v = (d * x + e * y + f) / w - 0.5
      if (!(u >= 0 && v >= 0 && u < width - 1 && v < height - 1)) continue
      const [m, n] = [u | 0, v | 0]
      const [p, q] = [u - m, v - n]
      const at = n * width + m
      out[k] = (data[at]! * (1 - p) + data[at + 1]! * p) * (1 - q) + (data[at + width]! * (1 - p) + data[at + width + 1]! * p) * q
    }
  }
  return out
}

const known = new WeakMap<BlankPage, Map<string, Uint8Array>>()

/** Where the blank page has print, or has it right beside (1). The same for every leaf, so it is looked up once. */
function printOf(blank: BlankPage, left: number, top: number, wide: number, high: number): Uint8Array {
  const boxes = known.get(blank) ?? new Map<string, Uint8Array>()
  known.set(blank, boxes)
  const key = `${left} ${top} ${wide} ${high}`
  const seen = boxes.get(key)
  if (seen) return seen
  const k = templateDpi / 72
  const print = Uint8Array.from({ length: wide * high }, (_, at) => (isPrint(blank.picture, (left + (at % wide) / density) * k, (top + Math.floor(at / wide) / density) * k) ? 1 : 0))
  boxes.set(key, print)
  return print
}

/** Whether the blank page has print at a place (pixels of 100 dpi) or right beside it. */
function isPrint({ width, height, data }: GreyPicture, x: number, y: number): boolean {
  for (let v = Math.floor(y) - 1; v <= Math.floor(y) + 1; v++)
    for (let u = Math.floor(x) - 1; u <= Math.floor(x) + 1; u++) if (u >= 0 && v >= 0 && u < width && v < height && data[v * width + u]! < printed) return true
  return false
}

/** How bright the paper is: the tone that a quarter of a box is brighter than. */
function paperTone(grey: Uint8Array): number {
  const counts = new Uint32Array(256)
  for (const v of grey) counts[v]!++
  let left = grey.length / 4
  let tone = 255
  while (tone > 0 && (left -= counts[tone]!) > 0) tone--
  return tone
}
