import type { GreyPicture } from '@/lib/core/grey-picture'
import { words, type Memory } from './memory'

/**
 * A leaf's ink turned upright, with running sums of it and of its squares, one line and column more than the picture. They run over
 * beyond 32 bits, which a difference of them does not mind.
 */
export type Upright = Readonly<{ width: number; height: number; data: Uint8Array; sums: Uint32Array; squares: Uint32Array }>

/** A leaf's ink turned upright about its middle, on a canvas of the given size whose middle is (dx, dy) off the leaf's, seen upright. */
export function upright(ink: GreyPicture, degrees: number, width: number, height: number, memory: Memory, use: string, dx = 0, dy = 0): Upright {
  const data = memory(use, width * height)
  const angle = (degrees * Math.PI) / 180
  const [c, s] = [Math.cos(angle), Math.sin(angle)]
  for (let y = 0; y < height; y++) {
    const u = c * (0.5 - width / 2 + dx) - s * (y + 0.5 - height / 2 + dy) + ink.width / 2 - 0.5
    const v = s * (0.5 - width / 2 + dx) + c * (y + 0.5 - height / 2 + dy) + ink.height / 2 - 0.5
    turnLine(ink.data, ink.width, ink.height, u, v, c, s, data, y * width, width)
  }
  return summed(data, width, height, memory, use)
}

function turnLine(from: Uint8Array, w: number, h: number, u: number, v: number, du: number, dv: number, out: Uint8Array, to: number, width: number): void {
  for (let x = 0; x < width; x++, u += du, v += dv) {
    if (!(u >= 0 && v >= 0 && u < w - 1 && v < h - 1)) {
      out[to + x] = 0
      continue
    }
    const i = u | 0
    const j = v | 0
    const p = u - i
    const k = j * w + i
    const upper = from[k]! + (from[k + 1]! - from[k]!) * p
    const lower = from[k + w]! + (from[k + w + 1]! - from[k + w]!) * p
    out[to + x] = upper + (lower - upper) * (v - j) + 0.5
  }
}

/** The same seen upside down. */
export function upsideDown({ data, width, height }: Upright, memory: Memory, use: string): Upright {
  const turned = memory(use, data.length)
  turned.set(data)
  return summed(turned.reverse(), width, height, memory, use)
}

function summed(data: Uint8Array, width: number, height: number, memory: Memory, use: string): Upright {
  const stride = width + 1
  const sums = words(memory, `${use} sums`, stride * (height + 1))
  const squares = words(memory, `${use} squares`, stride * (height + 1))
  for (const running of [sums, squares]) {
    running.fill(0, 0, stride)
    for (let y = 1; y <= height; y++) running[y * stride] = 0
  }
  for (let y = 0; y < height; y++) sumLine(data, y * width, width, sums, squares, (y + 1) * stride + 1, stride)
  return { width, height, data, sums, squares }
}

function sumLine(data: Uint8Array, from: number, width: number, sums: Uint32Array, squares: Uint32Array, to: number, stride: number): void {
  let a = 0
  let b = 0
  for (let x = 0; x < width; x++) {
    const v = data[from + x]!
    a += v
    b += v * v
    sums[to + x] = sums[to + x - stride]! + a
    squares[to + x] = squares[to + x - stride]! + b
  }
}

/** The sum over a box by running sums. */
export function boxSum(running: Uint32Array, stride: number, x: number, y: number, w: number, h: number): number {
  return (running[(y + h) * stride + x + w]! - running[y * stride + x + w]! - running[(y + h) * stride + x]! + running[y * stride + x]!) >>> 0
}
