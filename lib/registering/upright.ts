import type { GreyPicture } from '@/lib/core/grey-picture'

/** A leaf's ink turned upright, with running sums of it and of its squares, one line and column more than the picture. */
export type Upright = Readonly<{ width: number; height: number; data: Uint8Array; sums: Float64Array; squares: Float64Array }>

/** A leaf's ink turned upright about its middle, on a canvas of the given size whose middle is (dx, dy) off the leaf's, seen upright. */
export function upright(ink: GreyPicture, degrees: number, width: number, height: number, dx = 0, dy = 0): Upright {
  const data = new Uint8Array(width * height)
  const angle = (degrees * Math.PI) / 180
  const [c, s] = [Math.cos(angle), Math.sin(angle)]
  const { width: w, height: h, data: from } = ink
  for (let y = 0, at = 0; y < height; y++) {
    let u = c * (0.5 - width / 2 + dx) - s * (y + 0.5 - height / 2 + dy) + w / 2 - 0.5
    let v = s * (0.5 - width / 2 + dx) + c * (y + 0.5 - height / 2 + dy) + h / 2 - 0.5
    for (let x = 0; x < width; x++, at++, u += c, v += s) {
      if (!(u >= 0 && v >= 0 && u < w - 1 && v < h - 1)) continue
      const [i, j] = [u | 0, v | 0]
      const p = u - i
      const k = j * w + i
      const upper = from[k]! + (from[k + 1]! - from[k]!) * p
      const lower = from[k + w]! + (from[k + w + 1]! - from[k + w]!) * p
      data[at] = upper + (lower - upper) * (v - j) + 0.5
    }
  }
  return summed(data, width, height)
}

/** The same seen upside down. */
export function upsideDown({ data, width, height }: Upright): Upright {
  return summed(data.slice().reverse(), width, height)
}

function summed(data: Uint8Array, width: number, height: number): Upright {
  const stride = width + 1
  const sums = new Float64Array(stride * (height + 1))
  const squares = new Float64Array(stride * (height + 1))
  for (let y = 0, k = 0; y < height; y++) {
    let [a, b] = [0, 0]
    for (let x = 0, at = (y + 1) * stride + 1; x < width; x++, k++, at++) {
      const v = data[k]!
      a += v
      b += v * v
      sums[at] = sums[at - stride]! + a
      squares[at] = squares[at - stride]! + b
    }
  }
  return { width, height, data, sums, squares }
}

/** The sum over a box by running sums. */
export function boxSum(running: Float64Array, stride: number, x: number, y: number, w: number, h: number): number {
  return running[(y + h) * stride + x + w]! - running[y * stride + x + w]! - running[(y + h) * stride + x]! + running[y * stride + x]!
}
