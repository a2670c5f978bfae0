import type { GreyPicture } from '@/lib/core/grey-picture'
import { areaShrink } from './area-shrink'
import { fresh, type Memory } from './memory'
import { withMats, type Cv } from './opencv'

/** A picture made smaller: a pixel (x, y) of it is (x * byX, y * byY) of the one it came from, in corner-based pixels. */
export type Shrunk = Readonly<{ picture: GreyPicture; byX: number; byY: number }>

/** Means of n x n boxes; what is left over at the right and lower edge is dropped. `use` names the memory that it lands in. */
export function boxShrink(picture: GreyPicture, n: number, memory: Memory = fresh, use = `box ${n}`): GreyPicture {
  if (n === 1) return picture
  const w = Math.max(1, Math.floor(picture.width / n))
  const h = Math.max(1, Math.floor(picture.height / n))
  const out = memory(use, w * h)
  const line = lines[n]
  if (!line || picture.width < n || picture.height < n) return manyBox(picture, n, out)
  for (let y = 0; y < h; y++) line(picture.data, y * n * picture.width, picture.width, out, y * w, w)
  return { width: w, height: h, data: out }
}

/** Fills a line of `w` pixels of `out`, from `to` on, from the lines of `data` that begin at `from`. */
type Line = (data: Uint8Array, from: number, width: number, out: Uint8Array, to: number, w: number) => void

// The usual sizes are written out: a leaf has millions of pixels, and an inner loop of two or three steps costs more than its work.
// Loops over pixels are functions of one line everywhere here: called thousands of times, they are compiled well from the first leaf on.
const lines: Readonly<Record<number, Line>> = { 2: twoLine, 3: threeLine, 4: fourLine }

function twoLine(data: Uint8Array, from: number, width: number, out: Uint8Array, to: number, w: number): void {
  for (let x = 0, a = from, b = from + width; x < w; x++, a += 2, b += 2) out[to + x] = (data[a]! + data[a + 1]! + data[b]! + data[b + 1]! + 2) >> 2
}

function threeLine(data: Uint8Array, from: number, width: number, out: Uint8Array, to: number, w: number): void {
  for (let x = 0, a = from, b = a + width, c = b + width; x < w; x++, a += 3, b += 3, c += 3) {
    const sum = data[a]! + data[a + 1]! + data[a + 2]! + data[b]! + data[b + 1]! + data[b + 2]! + data[c]! + data[c + 1]! + data[c + 2]!
    // a ninth, exactly, for sums up to 9 * 255
    out[to + x] = ((sum + 4) * 7282) >> 16
  }
}

function fourLine(data: Uint8Array, from: number, width: number, out: Uint8Array, to: number, w: number): void {
  for (let x = 0, a = from, b = a + width, c = b + width, d = c + width; x < w; x++, a += 4, b += 4, c += 4, d += 4) {
    const upper = data[a]! + data[a + 1]! + data[a + 2]! + data[a + 3]! + data[b]! + data[b + 1]! + data[b + 2]! + data[b + 3]!
    const lower = data[c]! + data[c + 1]! + data[c + 2]! + data[c + 3]! + data[d]! + data[d + 1]! + data[d + 2]! + data[d + 3]!
    out[to + x] = (upper + lower + 8) >> 4
  }
}

function manyBox({ width, height, data }: GreyPicture, n: number, out: Uint8Array): GreyPicture {
  const w = Math.max(1, Math.floor(width / n))
  const h = Math.max(1, Math.floor(height / n))
  const sums = new Uint32Array(w)
  const area = n * n
  for (let y = 0; y < h; y++) {
    sums.fill(0)
    for (let k = 0; k < n; k++) {
      let at = (y * n + k) * width
      for (let x = 0; x < w; x++) for (let j = 0; j < n; j++) sums[x]! += data[at++]!
    }
    for (let x = 0; x < w; x++) out[y * w + x] = sums[x]! / area
  }
  return { width: w, height: h, data: out }
}

/** Brings a picture of so many dots per inch to `dpi`: by boxes where the ratio is whole, else by area. */
export function shrinkTo(cv: Cv, picture: GreyPicture, dpiX: number, dpiY: number, dpi: number, memory: Memory = fresh): Shrunk {
  const n = Math.round(dpiX / dpi)
  if (n >= 1 && Math.abs(dpiX / dpi - n) < 0.02 * n && Math.abs(dpiY / dpi - n) < 0.02 * n)
    return { picture: boxShrink(picture, n, memory, 'leaf'), byX: n, byY: n }
  const width = Math.max(1, Math.round((picture.width * dpi) / dpiX))
  const height = Math.max(1, Math.round((picture.height * dpi) / dpiY))
  const by = { byX: picture.width / width, byY: picture.height / height }
  if (width < picture.width && height < picture.height) return { picture: areaShrink(picture, width, height, memory('leaf', width * height)), ...by }
  return { picture: stretched(cv, picture, width, height), ...by }
}

function stretched(cv: Cv, picture: GreyPicture, width: number, height: number): GreyPicture {
  return withMats(cv, (keep) => {
    const from = keep(matOf(cv, picture))
    const to = keep(new cv.Mat())
    cv.resize(from, to, new cv.Size(width, height), 0, 0, cv.INTER_LINEAR)
    return pictureOf(to)
  })
}

/** A copy of a grey picture in the vision engine's memory. */
export function matOf(cv: Cv, { width, height, data }: GreyPicture): InstanceType<Cv['Mat']> {
  const mat = new cv.Mat(height, width, cv.CV_8UC1)
  mat.data.set(data)
  return mat
}
/** A copy of a grey Mat outside of it. */
export function pictureOf(mat: InstanceType<Cv['Mat']>): GreyPicture {
  return { width: mat.cols, height: mat.rows, data: new Uint8Array(mat.data) }
}
