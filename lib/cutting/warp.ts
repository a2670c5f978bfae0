import type { Homography } from '@/lib/core/paper-space'

/** A picture of one or three channels, row by row. */
export type Pixels = Readonly<{ width: number; height: number; channels: 1 | 3; data: Uint8Array }>

/**
 * Draws a picture anew: each pixel of the result is looked up where `map` takes its middle (result pixels -> source pixels,
 * corner-based). Bilinear; outside of the source is white.
 */
export function warp(source: Pixels, map: Homography, width: number, height: number): Pixels {
  const { channels, data } = source
  const out = new Uint8Array(width * height * channels).fill(255)
  const [[a, b, c], [d, e, f], [g, h, i]] = map
  const stride = source.width * channels
  for (let y = 0, at = 0; y < height; y++)
    for (let x = 0; x < width; x++, at += channels) {
      const w = g * (x + 0.5) + h * (y + 0.5) + i
      const u = (a * (x + 0.5) + b * (y + 0.5) + c) / w - 0.5
      const v = (d * (x + 0.5) + e * (y + 0.5) + f) / w - 0.5
      const m = Math.floor(u)
      const n = Math.floor(v)
      if (!(m >= 0 && n >= 0 && m + 1 < source.width && n + 1 < source.height)) continue
      const [p, q] = [u - m, v - n]
      for (let k = 0, from = n * stride + m * channels; k < channels; k++, from++) {
        const above = data[from]! * (1 - p) + data[from + channels]! * p
        const below = data[from + stride]! * (1 - p) + data[from + stride + channels]! * p
        out[at + k] = above * (1 - q) + below * q + 0.5
      }
    }
  return { width, height, channels, data: out }
}
