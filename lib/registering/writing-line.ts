import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Homography } from '@/lib/core/paper-space'
import type { Template } from './template'

/** Along so few pixels a map is taken to be straight: what a scan bends within them is far less than a pixel. */
const span = 32
/** Places on the leaf are counted in 65536ths of a pixel. */
const one = 65536

/**
 * Takes one line of a page off a levelled leaf, as light as it is there where the blank page has no print near, white elsewhere.
 * `map` takes template to leaf pixels (100 dpi). Fills `line` from `from` to `to`.
 */
export function writingLine(leaf: GreyPicture, { clear, white: { width } }: Template, map: Homography, y: number, from: number, to: number, line: Uint8Array): void {
  const [a, b, c] = map[0]
  const [d, e, f] = map[1]
  const [g, h, i] = map[2]
  const [right, lower] = [(leaf.width - 1) * one, (leaf.height - 1) * one]
  const line0 = { u: b * (y + 0.5) + c, v: e * (y + 0.5) + f, w: h * (y + 0.5) + i }
  let scale = one / (line0.w + g * (from + 0.5))
  let u = Math.round((line0.u + a * (from + 0.5)) * scale)
  let v = Math.round((line0.v + d * (from + 0.5)) * scale)
  for (let x = from; x < to; x += span) {
    const count = Math.min(span, to - x)
    scale = one / (line0.w + g * (x + count + 0.5))
    const endU = Math.round((line0.u + a * (x + count + 0.5)) * scale)
    const endV = Math.round((line0.v + d * (x + count + 0.5)) * scale)
    const [du, dv] = [Math.trunc((endU - u) / count), Math.trunc((endV - v) / count)]
    // a pixel to spare: what is rounded stays inside
    const within = Math.min(u, endU, v, endV) >= one && Math.max(u, endU) < right && Math.max(v, endV) < lower
    if (within) takeAll(leaf.data, leaf.width, clear, y * width + x, count, u, v, du, dv, line, x)
    else takeSome(leaf, clear, y * width + x, count, u, v, du, dv, line, x)
    u = endU
    v = endV
  }
}

function takeAll(data: Uint8Array, width: number, clear: Uint8Array, at: number, count: number, u: number, v: number, du: number, dv: number, line: Uint8Array, x: number): void {
  for (let k = 0; k < count; k++) {
    // 255 where print is near
    line[x + k] = data[(v >> 16) * width + (u >> 16)]! | (clear[at + k]! - 1)
    u = (u + du) | 0
    v = (v + dv) | 0
  }
}

function takeSome({ width, height, data }: GreyPicture, clear: Uint8Array, at: number, count: number, u: number, v: number, du: number, dv: number, line: Uint8Array, x: number): void {
  for (let k = 0; k < count; k++, u += du, v += dv) {
    const m = u >> 16
    const n = v >> 16
    line[x + k] = clear[at + k] === 1 && m >= 0 && n >= 0 && m < width && n < height ? data[n * width + m]! : 255
  }
}
