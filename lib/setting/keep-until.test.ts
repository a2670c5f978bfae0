import { describe, expect, it } from 'vitest'
import { keepUntil } from './keep-until'

describe('the end of keeping', () => {
  it('is the same day so many months later, over years', () => {
    expect(keepUntil('2026-11-12', 14)).toBe('2028-01-12')
    expect(keepUntil('2026-12-31', 12)).toBe('2027-12-31')
  })
  it('takes the last day where the month is shorter', () => {
    expect(keepUntil('2026-12-31', 14)).toBe('2028-02-29')
    expect(keepUntil('2026-08-31', 1)).toBe('2026-09-30')
  })
})
