import type { GreyPicture } from '@/lib/core/grey-picture'

/** Strokes narrower than this vanish: 9 mm at 25 dpi. */
const side = 9
const edge = side >> 1

/**
 * The brightness of the paper behind what is on it, at 25 dpi: a closing by a square of 9 mm (the lightest within it, then the
 * darkest of those), smoothed. Beyond the picture's edge nothing counts.
 */
export function paperTone({ width, height, data }: GreyPicture): Uint8Array {
  const stride = width + 2 * edge
  const canvas = new Uint8Array(stride * (height + 2 * edge))
  const lay = (from: Uint8Array, at: number, across: number, beyond: number) => {
    canvas.fill(beyond)
    for (let y = 0; y < height; y++) canvas.set(from.subarray(at + y * across, at + y * across + width), (y + edge) * stride + edge)
  }
  lay(data, 0, width, 0)
  for (const step of [1, stride]) for (const by of doublings) lightest(canvas, step * by)
  lay(canvas.slice(), 0, stride, 255)
  for (const step of [1, stride]) for (const by of doublings) darkest(canvas, step * by)
  return smoothed(canvas, stride, width, height)
}

/** Looking 1, 2, 4 and 1 further on, each time at what was found before, looks 8 further on in all. */
const doublings = [1, 2, 4, 1]

// Every pixel becomes the extreme of itself and those after it, so a window's middle ends up at its first pixel.
function lightest(data: Uint8Array, by: number): void {
  for (let k = 0, end = data.length - by; k < end; k++) {
    const other = data[k + by]!
    if (other > data[k]!) data[k] = other
  }
}
function darkest(data: Uint8Array, by: number): void {
  for (let k = 0, end = data.length - by; k < end; k++) {
    const other = data[k + by]!
    if (other < data[k]!) data[k] = other
  }
}

/** Means of 5 x 5; at the edge the outermost pixels go on. */
function smoothed(from: Uint8Array, stride: number, width: number, height: number): Uint8Array {
  const lines = new Uint16Array(width * height)
  for (let y = 0; y < height; y++)
    for (let x = 0, at = y * stride, to = y * width; x < width; x++, to++) {
      if (x >= 2 && x + 2 < width) lines[to] = from[at + x - 2]! + from[at + x - 1]! + from[at + x]! + from[at + x + 1]! + from[at + x + 2]!
      else for (let k = -2; k <= 2; k++) lines[to]! += from[at + Math.min(width - 1, Math.max(0, x + k))]!
    }
  const out = new Uint8Array(width * height)
  for (let y = 0, to = 0; y < height; y++) {
    const [a, b, c, d, e] = [-2, -1, 0, 1, 2].map((k) => Math.min(height - 1, Math.max(0, y + k)) * width) as [number, number, number, number, number]
    // a 25th, exactly, for sums up to 25 * 255
    for (let x = 0; x < width; x++, to++) out[to] = ((lines[a + x]! + lines[b + x]! + lines[c + x]! + lines[d + x]! + lines[e + x]! + 12) * 5243) >> 17
  }
  return out
}
