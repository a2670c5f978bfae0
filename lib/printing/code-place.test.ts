import { describe, expect, it } from 'vitest'
import type { BlankPage } from '@/lib/core/grey-picture'
import type { PaperRect } from '@/lib/core/paper-space'
import { leastCodeSide, usualCodeSide } from '@/lib/core/printed-code'
import { codePlace } from './code-place'
import { pageGround } from './page-ground'
import { suggestCodePlace } from './suggest-code-place'

/** An A4 page at 72 dpi, white but for some print. */
function aPage(print: readonly PaperRect[], spaces: readonly PaperRect[] = []) {
  const [width, height] = [595, 842]
  const data = new Uint8Array(width * height).fill(255)
  for (const { x, y, w, h } of print) for (let row = y; row < y + h; row++) data.fill(0, row * width + x, row * width + x + w)
  const page: BlankPage = { page: 1, widthPoints: width, heightPoints: height, picture: { width, height, data } }
  return pageGround(page, spaces)
}
const square = (x: number, y: number, side = 57): PaperRect => ({ x, y, w: side, h: side })

describe('a place for the code', () => {
  it('is good on white paper, with the name beside it', () => {
    expect(codePlace(square(500, 30), aPage([]))).toMatchObject({ rect: square(500, 30), align: 'right', line: { w: 190 } })
    expect(codePlace(square(20, 30), aPage([]))).toMatchObject({ align: 'left', line: { x: 80 } })
  })
  it('is refused over print, over an answer space, near the edge, and too small to be read', () => {
    expect(codePlace(square(500, 30), aPage([{ x: 555, y: 85, w: 2, h: 1 }]))).toBe('over_print')
    expect(codePlace(square(500, 30), aPage([], [{ x: 40, y: 80, w: 500, h: 90 }]))).toBe('over_space')
    expect(codePlace(square(539, 30), aPage([]))).toBe('off_page')
    expect(codePlace(square(500, -20), aPage([]))).toBe('off_page')
    expect(codePlace(square(500, 30, leastCodeSide - 1), aPage([]))).toBe('too_small')
    expect(codePlace(square(400, 30, 130), aPage([]))).toBe('too_large')
  })
  it('is refused where no line is free for the name', () => {
    const round = [{ x: 300, y: 300, w: 295, h: 20 }, { x: 300, y: 380, w: 295, h: 200 }, { x: 300, y: 300, w: 150, h: 280 }]
    expect(codePlace(square(480, 321), aPage(round))).toBe('no_room_for_name')
  })
  it('puts the name where there is room for it', () => {
    const place = codePlace(square(480, 100), aPage([{ x: 400, y: 90, w: 76, h: 80 }]))
    expect(place).toMatchObject({ line: { y: 157 } })
  })
})

describe('the suggested place', () => {
  it('lies at the top right of an empty page and serves all pages at once', () => {
    const one = suggestCodePlace([aPage([])])!
    expect(one.x).toBeGreaterThan(480)
    expect(one.y).toBeLessThan(40)
    expect(one.w).toBeCloseTo(usualCodeSide, 1)
    const busyTop = aPage([{ x: 0, y: 0, w: 595, h: 700 }])
    const both = suggestCodePlace([aPage([]), busyTop])!
    expect(both.y).toBeGreaterThan(690)
  })
  it('gets smaller before it gives up, and gives up on a full page', () => {
    const strip = aPage([{ x: 0, y: 0, w: 595, h: 770 }, { x: 0, y: 827, w: 595, h: 15 }])
    expect(suggestCodePlace([strip])!.w).toBeCloseTo(leastCodeSide, 1)
    expect(suggestCodePlace([aPage([{ x: 0, y: 0, w: 595, h: 842 }])])).toBeNull()
  })
})
