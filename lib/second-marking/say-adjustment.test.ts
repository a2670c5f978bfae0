import { describe, expect, it } from 'vitest'
import { sayAdjustment } from './say-adjustment'

describe('an adjustment in words', () => {
  const at = Date.UTC(2026, 11, 1, 9)
  it('says which way, how far and when', () => {
    expect(sayAdjustment(1, at)).toBe('raised by ½ mark after second marking, 1 December 2026')
    expect(sayAdjustment(-3, at)).toBe('lowered by 1½ marks after second marking, 1 December 2026')
  })
})
