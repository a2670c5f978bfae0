import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { halves, type MarkingStep } from '@/lib/core/marks'
import { patternOf } from './pattern-of'

const maximum = halves(20)
const pairsOf = (differences: readonly number[], tolerance = 1) => differences.map((difference, k) => ({ first: halves(8 + (k % 4) + Math.max(0, difference)), second: halves(8 + (k % 4) + Math.max(0, -difference)), tolerance: halves(tolerance) }))
const found = (differences: readonly number[], { tolerance = 1, step = 1 as MarkingStep, sampled = differences.length } = {}) => patternOf({ pairs: pairsOf(differences, tolerance), sampled, maximum, step })

describe('the pattern that calls for an adjustment', () => {
  it('is a shift that nearly all differences share', () => {
    expect(found([2, 2, 2, 3, 2, 1, 2, 2])).toEqual({ shift: -2, why: null })
    expect(found([-2, -3, -2, -2, -2, -2, -1, -2])).toEqual({ shift: 2, why: null })
  })
  it('lies on the step, midway to the smaller shift', () => {
    expect(found([3, 3, 3, 3, 3, 3, 3, 3], { step: 2 })).toEqual({ shift: -2, why: null })
    expect(found([2, 1, 2, 1, 2, 1, 2, 1])).toEqual({ shift: -1, why: null })
    expect(found([2, 2, 2, 0, 0, 0, 0, 0, 2, 0], { step: 2 })).toMatchObject({ shift: null })
  })
  it('is not asked for before everything is read, with too few, or while all is inside the tolerance', () => {
    expect(found([2, 2, 2, 2, 2, 2, 2], { sampled: 8 })).toEqual({ shift: null, why: 'unread' })
    expect(found([2, 2, 2, 2, 2, 2])).toEqual({ shift: null, why: 'too_few' })
    expect(found([1, 1, 1, 1, 1, 1, 1, 1])).toEqual({ shift: null, why: 'all_inside' })
    expect(found([])).toEqual({ shift: null, why: 'all_inside' })
  })
  it('is neither two-sided nor scattered', () => {
    expect(found([3, -3, 3, -3, 3, -3, 3, 3])).toEqual({ shift: null, why: 'not_one_sided' })
    expect(found([0, 0, 0, 0, 0, 0, 0, 6])).toEqual({ shift: null, why: 'not_one_sided' })
    expect(found([0, 6, 0, 6, 1, 6, 0, 6, 6])).toEqual({ shift: null, why: 'not_steady' })
  })
  it('is the same in any order, on the step, and never shifts the way the marks already lean', () => {
    fc.assert(fc.property(fc.array(fc.integer({ min: -6, max: 6 }), { maxLength: 30 }), fc.constantFrom<MarkingStep>(1, 2), fc.integer({ min: 0, max: 3 }), (differences, step, tolerance) => {
      const pairs = pairsOf(differences, tolerance)
      const pattern = patternOf({ pairs, sampled: pairs.length, maximum, step })
      expect(patternOf({ pairs: [...pairs].reverse(), sampled: pairs.length, maximum, step })).toEqual(pattern)
      if (pattern.shift === null) return
      const mean = differences.reduce((a, b) => a + b, 0) / differences.length
      expect(Math.abs(pattern.shift % step)).toBe(0)
      expect(Math.sign(pattern.shift)).toBe(-Math.sign(mean))
      expect(Math.abs(pattern.shift + mean)).toBeLessThanOrEqual(step / 2)
    }))
  })
})
