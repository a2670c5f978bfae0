import { describe, expect, it } from 'vitest'
import { compose, toPixels, turning, type Homography } from '@/lib/core/paper-space'
import { cutBox, pixelsPerPoint, pixelsUnder, type RawPicture } from './cut-box'

/** A white sheet of 400 x 300 pixels with a black square of 8 pixels about a place. */
function sheet(at: { x: number; y: number }): RawPicture {
  const data = new Uint8Array(400 * 300).fill(255)
  for (let y = Math.round(at.y) - 4; y < at.y + 4; y++) data.fill(0, y * 400 + Math.round(at.x) - 4, y * 400 + Math.round(at.x) + 4)
  return { width: 400, height: 300, channels: 1, data }
}

/** The middle of what is dark, in pixels. */
function middleOfDark({ width, height, data }: RawPicture): { x: number; y: number } {
  let [sum, sx, sy] = [0, 0, 0]
  for (let y = 0; y < height; y++) for (let x = 0; x < width; x++) {
    const dark = 255 - data[y * width + x]!
    sum += dark
    sx += dark * (x + 0.5)
    sy += dark * (y + 0.5)
  }
  return { x: sx / sum, y: sy / sum }
}

// Two pixels a point, a little askew and in perspective.
const askew: Homography = [[2, 0.05, 30], [-0.04, 2.02, 20], [0.00002, 0.00003, 1]]

describe('cutting a box out of a page', () => {
  it.each([['askew', askew], ['upside down', compose(turning(180, 400, 300), askew)]] as const)('puts what lies at a place of the paper at that place of the cut (%s)', (_, h) => {
    const at = { x: 90, y: 60 }
    const from = sheet(toPixels(h, at))
    const rect = { x: 50, y: 40, w: 100, h: 50 }
    const part = pixelsUnder(h, rect, from)!
    const data = new Uint8Array(part.width * part.height)
    for (let y = 0; y < part.height; y++) data.set(from.data.subarray((part.top + y) * 400 + part.left, (part.top + y) * 400 + part.left + part.width), y * part.width)
    const cut = cutBox({ width: part.width, height: part.height, channels: 1, data }, part, h, rect, 3, [])
    expect([cut.width, cut.height]).toEqual([300, 150])
    const dark = middleOfDark(cut)
    expect(Math.abs(dark.x - (at.x - rect.x) * 3)).toBeLessThan(1)
    expect(Math.abs(dark.y - (at.y - rect.y) * 3)).toBeLessThan(1)
  })

  it('covers a mask and leaves what is beside it', () => {
    const from = sheet(toPixels(askew, { x: 90, y: 60 }))
    const rect = { x: 50, y: 40, w: 100, h: 50 }
    const whole = { left: 0, top: 0, width: 400, height: 300 }
    const cut = cutBox(from, whole, askew, rect, 2, [{ x: 80, y: 50, w: 20, h: 20 }])
    expect(Math.min(...cut.data)).toBeGreaterThan(200)
    expect(cut.data[(2 * (60 - 40)) * cut.width + 2 * (90 - 50)]).toBe(228)
    expect(cut.data[0]).toBe(255)
  })

  it('is white where the paper lies off the sheet', () => {
    const cut = cutBox(sheet({ x: 200, y: 150 }), { left: 0, top: 0, width: 400, height: 300 }, askew, { x: 400, y: 300, w: 50, h: 20 }, 1, [])
    expect(new Set(cut.data)).toEqual(new Set([255]))
    expect(pixelsUnder(askew, { x: 400, y: 300, w: 50, h: 20 }, { width: 400, height: 300 })).toBeNull()
  })

  it('knows the resolution of the scan', () => {
    expect(pixelsPerPoint(askew, { x: 0, y: 0, w: 100, h: 50 })).toBeCloseTo(2, 1)
  })
})
