import { describe, expect, it } from 'vitest'
import { leastCodeSide } from '@/lib/core/printed-code'
import { allSame, centredAt, sayPlace, sized, withSpot } from './code-spot-edits'

const a4 = { page: 1, width: 595.28, height: 841.89 }
const pages = [a4, { ...a4, page: 2 }]

describe('a code’s place', () => {
  it('stays on the page and never gets too small to be read', () => {
    expect(centredAt({ x: 590, y: 4 }, a4)).toEqual({ x: 538.59, y: 0, w: 56.69, h: 56.69 })
    expect(sized(centredAt({ x: 300, y: 300 }, a4), -40, a4).w).toBeGreaterThanOrEqual(leastCodeSide)
  })
  it('is put on one page or on all', () => {
    const rect = centredAt({ x: 300, y: 300 }, a4)
    expect(withSpot([], { page: 2, rect }, pages, false)).toEqual([{ page: 2, rect }])
    const both = withSpot([], { page: 2, rect }, pages, true)
    expect(both.map(({ page }) => page)).toEqual([1, 2])
    expect(allSame(both)).toBe(true)
    expect(allSame(withSpot(both, { page: 1, rect: { ...rect, x: 5 } }, pages, false))).toBe(false)
  })
  it('is said from the nearer edges', () => {
    expect(sayPlace({ x: 512, y: 20, w: 56.69, h: 56.69 }, a4)).toBe('20 mm square, 9 mm from the right, 7 mm from the top')
  })
})
