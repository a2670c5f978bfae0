import type { GreyPicture } from '@/lib/core/grey-picture'
import { boxSum, type Upright } from './upright'

/** A piece of a blank page made ready for being looked for: where it has ink and how much, its mean, and its length once the mean is off. */
export type Inked = Readonly<{ width: number; height: number; xs: Int32Array; ys: Int32Array; values: Int32Array; mean: number; norm: number }>

export type Shift = Readonly<{ dx: number; dy: number; likeness: number }>

/** Less ink than this in a pixel does not tell one place from another. */
const faint = 2
/** So many of the best places of the coarse grid are looked at more closely. */
const closerLooks = 3
const unknown = -9

/** Makes a part of a picture of ink ready: the whole of it, or `width` x `height` from (x, y). */
export function inkedPart(picture: GreyPicture, x = 0, y = 0, width = picture.width, height = picture.height): Inked {
  const [xs, ys, values]: [number[], number[], number[]] = [[], [], []]
  let [sum, square] = [0, 0]
  for (let j = 0; j < height; j++)
    for (let i = 0; i < width; i++) {
      const v = picture.data[(y + j) * picture.width + x + i]!
      sum += v
      square += v * v
      if (v <= faint) continue
      xs.push(i)
      ys.push(j)
      values.push(v)
    }
  const n = width * height
  const norm = Math.sqrt(Math.max(1, square - (sum * sum) / n))
  return { width, height, xs: Int32Array.from(xs), ys: Int32Array.from(ys), values: Int32Array.from(values), mean: sum / n, norm }
}

/**
 * The shift at which a piece lies best on an upright canvas, by normalised correlation (-1..1); it is looked for within `margin` of its
 * place, whose upper left is (x, y) + margin. First on every second place, then round the best of those: print is wider than that.
 */
export function bestShift(canvas: Upright, piece: Inked, margin: Readonly<{ x: number; y: number }>, x = 0, y = 0): Shift {
  const [columns, rows] = [2 * margin.x + 1, 2 * margin.y + 1]
  const known = new Float64Array(columns * rows).fill(unknown)
  const offsets = piece.xs.map((px, k) => (piece.ys[k]! + y) * canvas.width + px + x)
  const at = (i: number, j: number): number => {
    if (i < 0 || j < 0 || i >= columns || j >= rows) return unknown
    const k = j * columns + i
    if (known[k] === unknown) known[k] = likeness(canvas, piece, offsets, x, y, i, j)
    return known[k]!
  }
  const grid: { i: number; j: number; value: number }[] = []
  for (let j = margin.y & 1; j < rows; j += 2) for (let i = margin.x & 1; i < columns; i += 2) grid.push({ i, j, value: at(i, j) })
  grid.sort((a, b) => b.value - a.value)
  const closer = grid.slice(0, closerLooks).map((place) => uphill(place, at))
  const best = closer.reduce((a, b) => (b.value > a.value ? b : a))
  return { dx: best.i - margin.x, dy: best.j - margin.y, likeness: best.value }
}

function uphill(from: { i: number; j: number; value: number }, at: (i: number, j: number) => number): { i: number; j: number; value: number } {
  let best = from
  for (;;) {
    const { i, j } = best
    for (let b = j - 1; b <= j + 1; b++)
      for (let a = i - 1; a <= i + 1; a++) {
        const value = at(a, b)
        if (value > best.value) best = { i: a, j: b, value }
      }
    if (best.i === i && best.j === j) return best
  }
}

function likeness({ width, data, sums, squares }: Upright, piece: Inked, offsets: Int32Array, x: number, y: number, i: number, j: number): number {
  const { values } = piece
  const start = j * width + i
  let dot = 0
  for (let k = 0; k < offsets.length; k++) dot = (dot + Math.imul(data[start + offsets[k]!]!, values[k]!)) | 0
  const sum = boxSum(sums, width + 1, x + i, y + j, piece.width, piece.height)
  const square = boxSum(squares, width + 1, x + i, y + j, piece.width, piece.height)
  const spread = Math.sqrt(Math.max(1, square - (sum * sum) / (piece.width * piece.height)))
  return (dot - piece.mean * sum) / (spread * piece.norm)
}
