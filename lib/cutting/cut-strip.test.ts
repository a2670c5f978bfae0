import sharp from 'sharp'
import { describe, expect, it } from 'vitest'
import type { BlankPage } from '@/lib/core/grey-picture'
import { compose, turning, type Homography, type PaperRect } from '@/lib/core/paper-space'
import { cutPixels, cutStrip } from './cut-strip'
import { inkShare, nothingWritten } from './ink-share'
import type { Pixels } from './warp'

/** A white leaf of 200 by 300 points at 144 dpi with black boxes, given in points; stored turned by 180 degrees when asked. */
function leaf(boxes: readonly PaperRect[], upsideDown = false): { source: Pixels; homography: Homography } {
  const [width, height] = [400, 600]
  const data = new Uint8Array(width * height).fill(255)
  for (const { x, y, w, h } of boxes) for (let row = y * 2; row < (y + h) * 2; row++) data.fill(0, row * width + x * 2, row * width + (x + w) * 2)
  if (upsideDown) data.reverse()
  const upright: Homography = [[2, 0, 0], [0, 2, 0], [0, 0, 1]]
  return { source: { width, height, channels: 1, data }, homography: upsideDown ? compose(turning(180, width, height), upright) : upright }
}
const box = { x: 40, y: 50, w: 20, h: 10 }
const at = ({ width, data }: Pixels, x: number, y: number) => data[y * width + x]

describe('cutting a strip', () => {
  it.each([false, true])('cuts what lies in a box of the paper, upright, however the leaf was fed (upside down: %s)', (upsideDown) => {
    const { source, homography } = leaf([box], upsideDown)
    const cut = cutPixels(source, homography, { x: 30, y: 40, w: 60, h: 40 }, 144)
    expect([cut.width, cut.height]).toEqual([120, 80])
    expect([at(cut, 21, 21), at(cut, 58, 38)]).toEqual([0, 0])
    expect([at(cut, 18, 21), at(cut, 62, 38), at(cut, 21, 18), at(cut, 58, 42)]).toEqual([255, 255, 255, 255])
  })
  it('paints a masked name over with paper white and leaves the rest', () => {
    const { source, homography } = leaf([box, { ...box, y: 70 }])
    const cut = cutPixels(source, homography, { x: 0, y: 0, w: 200, h: 300 }, 72, [{ x: 35, y: 45, w: 40, h: 20 }])
    expect([at(cut, 50, 55), at(cut, 50, 75)]).toEqual([255, 0])
  })
  it('gives a picture of the asked kind and size, white beyond the leaf', async () => {
    const { source, homography } = leaf([])
    const strip = await cutStrip(source, homography, { x: 150, y: 0, w: 100, h: 50 }, { dpi: 144, type: 'webp' })
    expect(await sharp(strip).metadata()).toMatchObject({ format: 'webp', width: 200, height: 100 })
    expect((await sharp(strip).stats()).channels[0]!.min).toBeGreaterThan(250)
  })
})

describe('ink in an answer space', () => {
  const blank: BlankPage = { page: 1, widthPoints: 200, heightPoints: 300, picture: { width: 278, height: 417, data: new Uint8Array(278 * 417).fill(255) } }
  const space = { x: 20, y: 30, w: 100, h: 100 }
  it('is the share of the space that was written on', () => {
    const { source, homography } = leaf([box])
    expect(inkShare(source, homography, space, blank)).toBeCloseTo(0.02, 2)
  })
  it('is nothing where nothing was written, print counting as none', () => {
    const { source, homography } = leaf([box])
    const data = new Uint8Array(blank.picture.data)
    const k = 100 / 72
    for (let y = Math.floor(50 * k); y < 60 * k; y++) data.fill(0, y * 278 + Math.floor(40 * k), y * 278 + Math.ceil(60 * k))
    const printed = { ...blank, picture: { ...blank.picture, data } }
    expect(inkShare(source, homography, space, printed)).toBeLessThan(nothingWritten)
    expect(inkShare(source, homography, space, blank)).toBeGreaterThan(nothingWritten)
  })
})
