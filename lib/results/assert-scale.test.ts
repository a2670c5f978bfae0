import { describe, expect, it } from 'vitest'
import { halves } from '@/lib/core/marks'
import { assertScale } from './assert-scale'

const scale = (...boundaries: [string, number][]) => ({ oddHalf: 'kept' as const, boundaries: boundaries.map(([grade, lowest]) => ({ grade, lowest: halves(lowest) })) })

describe('a grade scale', () => {
  it('may be empty, and may begin at nought and at the maximum', () => {
    expect(() => assertScale(scale(), halves(20))).not.toThrow()
    expect(() => assertScale(scale(['A', 20], ['B', 0]), halves(20))).not.toThrow()
  })
  it.each([
    ['a grade without a name', scale([' ', 3])],
    ['a name used twice', scale(['A', 5], ['A', 3])],
    ['two grades from the same mark on', scale(['A', 5], ['B', 5])],
    ['a boundary above the maximum', scale(['A', 21])],
  ])('refuses %s', (_, faulty) => {
    expect(() => assertScale(faulty, halves(20))).toThrowError(expect.objectContaining({ code: 'bad_input' }))
  })
})
