import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fairOrder } from './fair-order'

const ids = Array.from({ length: 29 }, (_, k) => `response-${k}`)

describe('fair order', () => {
  it('holds each response once and can be drawn again from its seed', () => {
    fc.assert(fc.property(fc.string(), (seed) => {
      expect([...fairOrder(ids, seed)].sort()).toEqual([...ids].sort())
      expect(fairOrder([...ids].reverse(), seed)).toEqual(fairOrder(ids, seed))
    }))
  })
  it('is another order for another seed', () => {
    expect(fairOrder(ids, 'one')).not.toEqual(fairOrder(ids, 'two'))
  })
  it('leaves the others in their order when a late script comes', () => {
    const later = fairOrder([...ids, 'late'], 'one')
    expect(later.filter((id) => id !== 'late')).toEqual(fairOrder(ids, 'one'))
  })
  it('puts each response in each half about as often', () => {
    const early = Array.from({ length: 400 }, (_, k) => fairOrder(ids, `seed ${k}`).indexOf('response-0') < ids.length / 2).filter(Boolean).length
    expect(early).toBeGreaterThan(160)
    expect(early).toBeLessThan(250)
  })
})
