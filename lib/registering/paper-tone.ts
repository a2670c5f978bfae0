import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Memory } from './memory'

/** Strokes narrower than this vanish: 9 mm at 25 dpi. */
const side = 9
const edge = side >> 1

/**
 * The brightness of the paper behind what is on it, at 25 dpi: a closing by a square of 9 mm (the lightest within it, then the
 * darkest of those), smoothed. Beyond the picture's edge nothing counts.
 */
export function paperTone({ width, height, data }: GreyPicture, memory: Memory): Uint8Array {
  const stride = width + 2 * edge
  const canvas = memory('tone canvas', stride * (height + 2 * edge))
  const lay = (from: Uint8Array, at: number, across: number, beyond: number) => {
    canvas.fill(beyond)
    for (let y = 0; y < height; y++) canvas.set(from.subarray(at + y * across, at + y * across + width), (y + edge) * stride + edge)
  }
  lay(data, 0, width, 0)
  sweep(canvas, stride, lightest)
  const lightestOf = memory('tone lightest', canvas.length)
  lightestOf.set(canvas)
  lay(lightestOf, 0, stride, 255)
  sweep(canvas, stride, darkest)
  return smoothed(canvas, stride, width, height, memory('tone', width * height))
}

/** Looking 1, 2, 4 and 1 further on, each time at what was found before, looks 8 further on in all. */
const doublings = [1, 2, 4, 1]

/**
 * Makes every pixel the extreme of the square that begins there, so a square's middle ends up at its upper left. Lines run into
 * each other, but only where there is nothing but edge.
 */
function sweep(canvas: Uint8Array, stride: number, extreme: (data: Uint8Array, from: number, to: number, by: number) => void): void {
  for (const step of [1, stride])
    for (const by of doublings) for (let from = 0, end = canvas.length - step * by; from < end; from += stride) extreme(canvas, from, Math.min(end, from + stride), step * by)
}
function lightest(data: Uint8Array, from: number, to: number, by: number): void {
  for (let k = from; k < to; k++) {
    const other = data[k + by]!
    if (other > data[k]!) data[k] = other
  }
}
function darkest(data: Uint8Array, from: number, to: number, by: number): void {
  for (let k = from; k < to; k++) {
    const other = data[k + by]!
    if (other < data[k]!) data[k] = other
  }
}

/** Means of 5 x 5; at the edge the outermost pixels go on. */
function smoothed(from: Uint8Array, stride: number, width: number, height: number, out: Uint8Array): Uint8Array {
  const lines = new Uint16Array(width * height)
  for (let y = 0; y < height; y++) sumLine(from, y * stride, width, lines, y * width)
  const line = (y: number) => Math.min(height - 1, Math.max(0, y)) * width
  for (let y = 0; y < height; y++) meanLine(lines, line(y - 2), line(y - 1), line(y), line(y + 1), line(y + 2), out, y * width, width)
  return out
}

function sumLine(from: Uint8Array, at: number, width: number, lines: Uint16Array, to: number): void {
  for (let x = 2; x < width - 2; x++) lines[to + x] = from[at + x - 2]! + from[at + x - 1]! + from[at + x]! + from[at + x + 1]! + from[at + x + 2]!
  for (const x of new Set([0, 1, width - 2, width - 1]))
    if (x >= 0 && x < width) {
      lines[to + x] = 0
      for (let k = -2; k <= 2; k++) lines[to + x]! += from[at + Math.min(width - 1, Math.max(0, x + k))]!
    }
}

function meanLine(lines: Uint16Array, a: number, b: number, c: number, d: number, e: number, out: Uint8Array, to: number, width: number): void {
  // a 25th, exactly, for sums up to 25 * 255
  for (let x = 0; x < width; x++) out[to + x] = ((lines[a + x]! + lines[b + x]! + lines[c + x]! + lines[d + x]! + lines[e + x]! + 12) * 5243) >> 17
}
