import { compose, toPixels, type Homography, type PaperRect } from '@/lib/core/paper-space'

/** A picture row by row, `channels` bytes a pixel. */
export type RawPicture = Readonly<{ width: number; height: number; channels: number; data: Uint8Array }>
/** A box of pixels of a stored image. */
export type PixelBox = Readonly<{ left: number; top: number; width: number; height: number }>

const covered = 228

/** The pixels of a stored image that a box of the paper lies on, with a little air for blending; null when it lies outside. */
export function pixelsUnder(h: Homography, rect: PaperRect, image: Readonly<{ width: number; height: number }>): PixelBox | null {
  const at = [{ x: rect.x, y: rect.y }, { x: rect.x + rect.w, y: rect.y }, { x: rect.x + rect.w, y: rect.y + rect.h }, { x: rect.x, y: rect.y + rect.h }].map((corner) => toPixels(h, corner))
  const left = Math.max(0, Math.floor(Math.min(...at.map(({ x }) => x))) - 2)
  const top = Math.max(0, Math.floor(Math.min(...at.map(({ y }) => y))) - 2)
  const width = Math.min(image.width, Math.ceil(Math.max(...at.map(({ x }) => x))) + 2) - left
  const height = Math.min(image.height, Math.ceil(Math.max(...at.map(({ y }) => y))) + 2) - top
  return width > 0 && height > 0 ? { left, top, width, height } : null
}

/** How many pixels of the stored image go to a point of the paper, about the middle of a box. */
export function pixelsPerPoint(h: Homography, rect: PaperRect): number {
  const from = toPixels(h, { x: rect.x + rect.w / 2, y: rect.y + rect.h / 2 })
  const to = toPixels(h, { x: rect.x + rect.w / 2 + 1, y: rect.y + rect.h / 2 })
  return Math.hypot(to.x - from.x, to.y - from.y)
}

/**
 * Cuts a box out of a page in paper space: upright, level and at `scale` pixels a point, blended from the four pixels round each place. `part` is the piece of the stored image
 * that `from` holds. What lies off the sheet is white; masks (paper points) are covered.
 */
export function cutBox(from: RawPicture, part: PixelBox, h: Homography, rect: PaperRect, scale: number, masks: readonly PaperRect[]): RawPicture {
  const width = Math.max(1, Math.round(rect.w * scale))
  const height = Math.max(1, Math.round(rect.h * scale))
  const { channels } = from
  const data = new Uint8Array(width * height * channels).fill(255)
  const [a, b, c] = compose([[1, 0, -part.left - 0.5], [0, 1, -part.top - 0.5], [0, 0, 1]], compose(h, [[rect.w / width, 0, rect.x], [0, rect.h / height, rect.y], [0, 0, 1]]))
  for (let y = 0, out = 0; y < height; y++) {
    for (let x = 0; x < width; x++, out += channels) {
      const over = c[0] * (x + 0.5) + c[1] * (y + 0.5) + c[2]
      const u = (a[0] * (x + 0.5) + a[1] * (y + 0.5) + a[2]) / over
      const v = (b[0] * (x + 0.5) + b[1] * (y + 0.5) + b[2]) / over
      if (u < 0 || v < 0 || u >= from.width - 1 || v >= from.height - 1) continue
      blend(from, u, v, data, out)
    }
  }
  const cut = { width, height, channels, data }
  for (const mask of masks) cover(cut, rect, mask)
  return cut
}

function blend({ width, channels, data }: RawPicture, u: number, v: number, into: Uint8Array, out: number): void {
  const left = Math.floor(u)
  const top = Math.floor(v)
  const right = u - left
  const low = v - top
  const at = (top * width + left) * channels
  const next = at + width * channels
  for (let k = 0; k < channels; k++) {
    const upper = data[at + k]! * (1 - right) + data[at + channels + k]! * right
    const lower = data[next + k]! * (1 - right) + data[next + channels + k]! * right
    into[out + k] = upper * (1 - low) + lower * low + 0.5
  }
}

function cover({ width, height, channels, data }: RawPicture, rect: PaperRect, mask: PaperRect): void {
  const x = (at: number): number => Math.min(width, Math.max(0, Math.round(((at - rect.x) * width) / rect.w)))
  const y = (at: number): number => Math.min(height, Math.max(0, Math.round(((at - rect.y) * height) / rect.h)))
  for (let row = y(mask.y); row < y(mask.y + mask.h); row++) data.fill(covered, (row * width + x(mask.x)) * channels, (row * width + x(mask.x + mask.w)) * channels)
}
