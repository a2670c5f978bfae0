import { describe, expect, it } from 'vitest'
import { boundsOf } from '@/lib/core/ink'
import { halves } from '@/lib/core/marks'
import { toPixels, type Homography } from '@/lib/core/paper-space'
import { aStampAt } from '@/tests/make/a-script-to-return'
import { codesOn, drawMarkedPage, sayMarkedPage, type MarkedPage } from './marked-page'

const press = (kind: string, worth: number, more = {}) => ({ stamp: aStampAt(100, 200, { kind, worth, ...more }), pen: 'first' as const, label: '1a' })
const aMarkedPage = (more: Partial<MarkedPage> = {}): MarkedPage => ({
  paper: { width: 595, height: 842 },
  image: { width: 1654, height: 2339 },
  // Shifted 8 mm to the right and down: the scan has lost the paper's right and lower edges.
  homography: [[2.78, 0.02, 63], [-0.02, 2.78, 63], [0, 0, 1]] as Homography,
  stamps: [press('tick', 2), press('note', 0, { text: 'well set out' }), press('tick', 2, { removed: true })],
  marks: [{ label: '1a', space: { x: 48, y: 150, w: 500, h: 90 }, mark: halves(2), pen: 'agreed' }],
  total: { mark: halves(2), pen: 'agreed' },
  ...more,
})

describe('a marked page', () => {
  it('shows every ring whole, also where the scan has lost the edge of the paper', () => {
    const page = aMarkedPage()
    for (const { inks } of drawMarkedPage(page).slice(2)) {
      const box = boundsOf(inks)!
      for (const corner of [{ x: box.x, y: box.y }, { x: box.x + box.w, y: box.y + box.h }]) {
        const { x, y } = toPixels(page.homography, corner)
        expect(x).toBeGreaterThanOrEqual(0)
        expect(x).toBeLessThanOrEqual(1654)
        expect(y).toBeLessThanOrEqual(2339)
      }
    }
  })

  it('leaves out what was taken back', () => {
    expect(drawMarkedPage(aMarkedPage({ marks: [], total: null }))).toHaveLength(2)
  })

  it('says itself in words', () => {
    expect(sayMarkedPage(aMarkedPage(), 2)).toBe('Page 2 of the script, a picture of handwriting. Question 1a: Tick, one mark; Note: well set out; mark 1.')
    expect(sayMarkedPage({ stamps: [], marks: [] }, 1)).toBe('Page 1 of the script, a picture of handwriting.')
  })

  it('explains each known code once', () => {
    const codes = codesOn([press('code', 0, { text: 'ft' }), press('code', 0, { text: 'ft' }), press('code', 0, { text: 'own' })])
    expect(codes).toEqual([{ code: 'ft', means: 'follow through' }])
  })
})
