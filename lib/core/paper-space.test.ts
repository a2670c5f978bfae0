import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { compose, corners, homographyFrom, inverse, toPaper, toPixels, turning, turnOf, type Homography, type Turn } from './paper-space'

/** Scans as a copier makes them: any turn by a few degrees, some stretch, some shift, a little perspective. */
const scans = fc
  .record({ turn: fc.constantFrom<Turn>(0, 90, 180, 270), skew: fc.double({ min: -5, max: 5, noNaN: true }), scale: fc.double({ min: 1.5, max: 4.5, noNaN: true }), x: fc.double({ min: -60, max: 60, noNaN: true }), y: fc.double({ min: -60, max: 60, noNaN: true }), bend: fc.double({ min: -2e-5, max: 2e-5, noNaN: true }) })
  .map(({ turn, skew, scale, x, y, bend }) => {
    const angle = ((skew - turn) * Math.PI) / 180
    const [c, s] = [Math.cos(angle) * scale, Math.sin(angle) * scale]
    const middle: Homography = [[c, -s, 1200 + x], [s, c, 1500 + y], [0, bend, 1]]
    return { turn, h: compose(middle, [[1, 0, -300], [0, 1, -420], [0, 0, 1]]) }
  })
const points = fc.record({ x: fc.double({ min: 0, max: 600, noNaN: true }), y: fc.double({ min: 0, max: 850, noNaN: true }) })

describe('paper space', () => {
  it('comes back from the scan to the same paper point', () => {
    fc.assert(
      fc.property(scans, points, ({ h }, at) => {
        const back = toPaper(h, toPixels(h, at))
        expect(Math.hypot(back.x - at.x, back.y - at.y)).toBeLessThan(1e-6)
      }),
    )
  })
  it('tells from the homography how a leaf must be turned to read upright', () => {
    fc.assert(
      fc.property(scans, ({ h, turn }) => {
        expect(turnOf(h, { x: 300, y: 420 })).toBe(turn)
      }),
    )
  })
  it('finds the homography again from the four corners of a box', () => {
    fc.assert(
      fc.property(scans, points, ({ h }, at) => {
        const box = corners({ x: 40, y: 50, w: 500, h: 700 })
        const found = homographyFrom(box, box.map((corner) => toPixels(h, corner)))!
        const [a, b] = [toPixels(found, at), toPixels(h, at)]
        expect(Math.hypot(a.x - b.x, a.y - b.y)).toBeLessThan(1e-4)
      }),
    )
  })
  it('has no homography through three corners on one line and a fourth with them', () => {
    const line = [0, 1, 2, 3].map((k) => ({ x: k, y: k }))
    expect(homographyFrom(line, line)).toBeNull()
  })
  it.each([
    [90, { x: 10, y: 20 }, { x: 400 - 20, y: 10 }],
    [180, { x: 10, y: 20 }, { x: 300 - 10, y: 400 - 20 }],
    [270, { x: 10, y: 20 }, { x: 20, y: 300 - 10 }],
  ] as const)('turns a picture of 300 by 400 by %i degrees clockwise', (turn, from, to) => {
    expect(toPixels(turning(turn, 300, 400), from)).toEqual(to)
  })
  it('undoes a homography with its inverse', () => {
    const h: Homography = [[2, 0.1, 5], [-0.1, 2.1, 7], [1e-5, 0, 1]]
    const same = compose(inverse(h), h).flat()
    same.forEach((v, k) => expect(v / same[8]!).toBeCloseTo(k % 4 === 0 ? 1 : 0, 9))
  })
})
