import { describe, expect, it } from 'vitest'
import { compose, toPixels, type Homography } from '@/lib/core/paper-space'
import { steadyFit } from './steady-fit'

const angle = (3 * Math.PI) / 180
/** A scan 3 degrees askew, 1 % too small, stretched by 0.2 %, 4 pixels off. */
const scan: Homography = compose([[0.99 * Math.cos(angle), -0.99 * Math.sin(angle), 40], [0.99 * Math.sin(angle), 0.99 * Math.cos(angle), 4], [0, 0, 1]], [[1.001, 0, 0], [0, 0.999, 0], [2e-6, -1e-6, 1]])
/** Places of print that was followed to about a quarter of a pixel. */
function tracks(places: readonly (readonly [number, number])[]) {
  return places.map(([x, y], k) => {
    const { x: u, y: v } = toPixels(scan, { x, y })
    return { x, y, u: u + 0.25 * Math.sin(k * 12.9), v: v + 0.25 * Math.cos(k * 78.2), weight: 1 }
  })
}
const off = (map: Homography, x: number, y: number) => {
  const [is, should] = [toPixels(map, { x, y }), toPixels(scan, { x, y })]
  return Math.hypot(is.x - should.x, is.y - should.y)
}
const grid = (columns: number, rows: number, height: number) => Array.from({ length: columns * rows }, (_, k) => [60 + ((k % columns) * 700) / columns, 60 + (Math.floor(k / columns) * height) / Math.max(1, rows - 1)] as const)

describe('a steady fit', () => {
  it('finds a scan exactly where print stands all over the page', () => {
    const map = steadyFit(tracks(grid(12, 20, 1000)))!
    for (const [x, y] of [[0, 0], [827, 0], [0, 1169], [827, 1169]] as const) expect(off(map, x, y)).toBeLessThan(0.3)
  })
  it('keeps the foot of a page within half a millimetre (2 pixels) when two lines at its top are all that is printed', () => {
    const map = steadyFit(tracks(grid(40, 2, 20)))!
    for (const [x, y] of [[60, 1100], [760, 1100]] as const) expect(off(map, x, y)).toBeLessThan(2.4)
  })
  it('has nothing to say about pairs in one place', () => {
    expect(steadyFit(tracks([[100, 100], [101, 100], [100, 101]]))).toBeNull()
  })
})
