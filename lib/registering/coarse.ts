import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Turn } from '@/lib/core/paper-space'

/** Where a page may lie on a leaf: its middle is shifted by (dx, dy) of 12.5 dpi, then all is turned by `degrees` clockwise about the leaf's middle. */
export type CoarsePlace = Readonly<{ turn: Turn; degrees: number; dx: number; dy: number; likeness: number }>

/** Looks further than this only where the leaf's size differs from the paper's: 12 mm, in pixels of 12.5 dpi. */
const reach12 = 6

/** A leaf's ink turned upright about its middle, on a canvas of the given size whose middle is (dx, dy) off the leaf's, seen upright. */
export function uprightInk(ink: GreyPicture, degrees: number, width: number, height: number, dx = 0, dy = 0): Float32Array {
  const out = new Float32Array(width * height)
  const angle = (degrees * Math.PI) / 180
  const [c, s] = [Math.cos(angle), Math.sin(angle)]
  const { width: w, height: h, data } = ink
  for (let y = 0, at = 0; y < height; y++) {
    let u = c * (0.5 - width / 2 + dx) - s * (y + 0.5 - height / 2 + dy) + w / 2 - 0.5
    let v = s * (0.5 - width / 2 + dx) + c * (y + 0.5 - height / 2 + dy) + h / 2 - 0.5
    for (let x = 0; x < width; x++, at++, u += c, v += s) {
      const i = Math.floor(u)
      const j = Math.floor(v)
      if (i < 0 || j < 0 || i + 1 >= w || j + 1 >= h) continue
      const [p, q] = [u - i, v - j]
      const k = j * w + i
      out[at] = (data[k]! * (1 - p) + data[k + 1]! * p) * (1 - q) + (data[k + w]! * (1 - p) + data[k + w + 1]! * p) * q
    }
  }
  return out
}

/** Margin round the template within which a leaf of another size is searched, in pixels of the density of the pictures. */
export function marginsFor(ink: GreyPicture, template: GreyPicture, sideways: boolean): { x: number; y: number } {
  const [w, h] = sideways ? [ink.height, ink.width] : [ink.width, ink.height]
  return { x: reach12 + Math.ceil(Math.abs(w - template.width) / 2), y: reach12 + Math.ceil(Math.abs(h - template.height) / 2) }
}

/** The shift at which a template's ink lies best on an upright canvas, by normalised correlation (-1..1). */
export function bestShift(canvas: Float32Array, template: GreyPicture, margin: { x: number; y: number }): { dx: number; dy: number; likeness: number } {
  const width = template.width + 2 * margin.x
  const height = template.height + 2 * margin.y
  const { offsets, values, mean, norm } = sparse(template, width)
  const sums = summed(canvas, width, height)
  const n = template.width * template.height
  let best = { dx: 0, dy: 0, likeness: -1 }
  for (let y = 0; y <= 2 * margin.y; y++)
    for (let x = 0; x <= 2 * margin.x; x++) {
      const start = y * width + x
      let dot = 0
      for (let k = 0; k < offsets.length; k++) dot += canvas[start + offsets[k]!]! * values[k]!
      const [sum, square] = sums(x, y, template.width, template.height)
      const spread = Math.sqrt(Math.max(1, square - (sum * sum) / n))
      const likeness = (dot - mean * sum) / (spread * norm)
      if (likeness > best.likeness) best = { dx: x - margin.x, dy: y - margin.y, likeness }
    }
  return best
}

function sparse({ width, height, data }: GreyPicture, stride: number): { offsets: Int32Array; values: Float32Array; mean: number; norm: number } {
  const offsets: number[] = []
  const values: number[] = []
  let sum = 0
  let square = 0
  for (let k = 0; k < data.length; k++) {
    const v = data[k]!
    sum += v
    square += v * v
    if (v > 2) {
      offsets.push(Math.floor(k / width) * stride + (k % width))
      values.push(v)
    }
  }
  const n = width * height
  return { offsets: Int32Array.from(offsets), values: Float32Array.from(values), mean: sum / n, norm: Math.sqrt(Math.max(1, square - (sum * sum) / n)) }
}

/** Sum and sum of squares over any box, from running sums. */
function summed(canvas: Float32Array, width: number, height: number): (x: number, y: number, w: number, h: number) => [number, number] {
  const stride = width + 1
  const ones = new Float64Array(stride * (height + 1))
  const squares = new Float64Array(stride * (height + 1))
  for (let y = 0; y < height; y++) {
    let [a, b] = [0, 0]
    for (let x = 0; x < width; x++) {
      const v = canvas[y * width + x]!
      a += v
      b += v * v
      const at = (y + 1) * stride + x + 1
      ones[at] = ones[at - stride]! + a
      squares[at] = squares[at - stride]! + b
    }
  }
  const box = (of: Float64Array, x: number, y: number, w: number, h: number) => of[(y + h) * stride + x + w]! - of[y * stride + x + w]! - of[(y + h) * stride + x]! + of[y * stride + x]!
  return (x, y, w, h) => [box(ones, x, y, w, h), box(squares, x, y, w, h)]
}
